/**
 * Reads a gauge file as it streams in, in little memory.
 * @module
 */
import { describe, InputError, type LongWork } from '@staithe/core';
import { gaugeReader } from './internal/reader.js';
import type { GaugeRecord, ReadOptions } from './record.js';

/** A stream of bytes: the host's own `ReadableStream<Uint8Array>` fits. @public */
export interface ByteStreamLike {
  /** Takes the stream for itself. */
  getReader(): {
    /** The next piece, or the end. */
    read(): Promise<{ readonly done: boolean; readonly value?: Uint8Array | undefined }>;
    /** Lets the rest go. */
    cancel(reason?: unknown): Promise<unknown>;
  };
}

/** A file: the host's own `Blob` and `File` fit. @public */
export interface BlobLike {
  readonly size: number;
  /** Its bytes. */
  stream(): ByteStreamLike;
}

/** Where a gauge file can come from. @public */
export type GaugeSource = BlobLike | ByteStreamLike | AsyncIterable<string | Uint8Array>;

interface Decoder {
  decode(bytes?: Uint8Array, options?: { stream: boolean }): string;
}

const PIECE = 65536; // bytes or characters
const BREATH = 20; // ms

function decoderFor(first: Uint8Array): Decoder {
  const { TextDecoder } = globalThis as unknown as { TextDecoder: new (label: string) => Decoder };
  const mark = (first[0] ?? 0) * 256 + (first[1] ?? 0);
  if (mark === 0xfffe) return new TextDecoder('utf-16le');
  return new TextDecoder(mark === 0xfeff ? 'utf-16be' : 'utf-8');
}

/** Any source as pieces. */
async function* piecesOf(source: GaugeSource): AsyncGenerator<string | Uint8Array, void, void> {
  const anySource = source as Partial<BlobLike & ByteStreamLike & AsyncIterable<Uint8Array>> | null;
  if (typeof anySource !== 'object' || anySource === null) {
    const got = describe(source);
    throw new InputError('WRONG_TYPE', 'source', `expected a Blob or a stream, got ${got}`);
  }
  if (anySource[Symbol.asyncIterator]) {
    yield* source as AsyncIterable<string | Uint8Array>;
    return;
  }
  const stream = anySource.stream ? anySource.stream() : (source as ByteStreamLike);
  if (typeof stream.getReader !== 'function') {
    throw new InputError('WRONG_TYPE', 'source', 'expected a Blob or a stream, got an object');
  }
  const reader = stream.getReader();
  let whole = false;
  try {
    for (;;) {
      const { done, value } = await reader.read();
      if (done) {
        whole = true;
        return;
      }
      if (value) yield value;
    }
  } finally {
    if (!whole) await reader.cancel();
  }
}

/**
 * Reads a gauge record from a file or stream, holding the numbers and one unfinished line, never the text.
 *
 * @param source - A `Blob` or `File`, a stream of bytes (`ReadableStream`, a Node stream), or pieces of text or bytes.
 * UTF-8, or UTF-16 with its mark.
 * @param options - As for `parseGaugeCsv`; `signal` aborts, `onProgress` counts bytes (or characters of text; `total`
 * is 0 where the source does not know it).
 * @returns The record, as from `parseGaugeCsv`. An abort rejects with `signal.reason`.
 * @throws InputError as `parseGaugeCsv`, and `WRONG_TYPE`, path `source`. The source is cancelled.
 * @example
 * const file = new Blob(['time_utc,height_m\n2031-06-01T00:00,1.52\n2031-06-01T00:06,1.49\n']);
 * (await readGaugeCsv(file)).series.step; // 360000
 * @public
 */
export async function readGaugeCsv(
  source: GaugeSource,
  options: ReadOptions & LongWork = {},
): Promise<GaugeRecord> {
  const { signal, onProgress } = options;
  const reader = gaugeReader(options);
  const total = (source as Partial<BlobLike> | null)?.size ?? 0;
  const host = globalThis as { setTimeout?: (call: () => void, ms: number) => unknown };
  const stopIfAborted = (): void => {
    if (signal?.aborted) throw signal.reason ?? new Error('aborted');
  };
  let decoder: Decoder | undefined;
  let done = 0;
  let rested = Date.now();
  stopIfAborted();
  for await (const piece of piecesOf(source)) {
    if (typeof piece !== 'string' && !(piece instanceof Uint8Array)) {
      const got = describe(piece);
      throw new InputError('WRONG_TYPE', 'source', `expected text or bytes, got ${got}`);
    }
    for (let at = 0; at < piece.length; at += PIECE) {
      stopIfAborted();
      if (typeof piece === 'string') reader.take(piece.slice(at, at + PIECE));
      else {
        const part = piece.subarray(at, at + PIECE);
        decoder ??= decoderFor(part);
        reader.take(decoder.decode(part, { stream: true }));
      }
      done += Math.min(PIECE, piece.length - at);
      if (Date.now() - rested < BREATH) continue;
      onProgress?.({ done, total, stage: 'read' });
      if (host.setTimeout) {
        await new Promise<void>((resolve) => {
          host.setTimeout?.(resolve, 0);
        });
      }
      rested = Date.now();
    }
  }
  stopIfAborted();
  if (decoder) reader.take(decoder.decode());
  const record = reader.finish();
  onProgress?.({ done, total, stage: 'read' });
  return record;
}

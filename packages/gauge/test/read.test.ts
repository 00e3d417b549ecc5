/**
 * Reading as a file streams in: any source, any cut, little memory, no line without end.
 */
import { MINUTE } from '@staithe/core';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseGaugeCsv, readGaugeCsv } from '../src/index.js';

const TEXT = [
  '\ufefftime_utc;height, observed (m)',
  '2031-06-01T00:00;1,5',
  '# Größe in m',
  '',
  '2031-06-01T00:06;1,25',
  '2031-06-01T00:12;',
  '2031-06-01T00:18;"1,1"',
].join('\r\n');
const WHOLE = parseGaugeCsv(TEXT);

async function* pieces<T>(list: readonly T[]): AsyncGenerator<T> {
  for (const piece of list) yield await Promise.resolve(piece);
}

describe('readGaugeCsv', () => {
  it('reads a Blob', async () => {
    expect(await readGaugeCsv(new Blob([TEXT]))).toEqual(WHOLE);
  });

  it('reads a stream of bytes that has no iterator', async () => {
    const { stream } = { stream: new Blob([TEXT]).stream() };
    const bare = { getReader: () => stream.getReader() };
    expect(await readGaugeCsv(bare)).toEqual(WHOLE);
  });

  it('reads UTF-16 with its mark', async () => {
    const bytes = Buffer.from(TEXT, 'utf16le');
    expect(await readGaugeCsv(pieces([new Uint8Array(bytes)]))).toEqual(WHOLE);
  });

  it('does not mind where pieces end', async () => {
    const bytes = new TextEncoder().encode(TEXT);
    await fc.assert(
      fc.asyncProperty(fc.array(fc.nat(bytes.length), { maxLength: 12 }), async (cuts) => {
        const ends = [0, ...cuts, bytes.length].sort((a, b) => a - b);
        const parts = ends.slice(1).map((end, i) => bytes.subarray(ends[i], end));
        expect(await readGaugeCsv(pieces(parts))).toEqual(WHOLE);
      }),
      { numRuns: 60, seed: 31 },
    );
  });

  it('streams 300 000 lines and finds their step and their gap', async () => {
    async function* file(): AsyncGenerator<string> {
      let text = 'time_utc,height_cm\n';
      for (let i = 0; i < 300000; i++) {
        if (i === 123456) continue;
        text += `${new Date(i * MINUTE).toISOString()},${(i % 997) / 10}\n`;
        if (text.length < 50000) continue;
        yield await Promise.resolve(text);
        text = '';
      }
      yield text;
    }
    const seen: number[] = [];
    const { series, reasons } = await readGaugeCsv(file(), {
      onProgress: ({ done }) => seen.push(done),
    });
    expect(series.step).toBe(MINUTE);
    expect(series.values.length).toBe(300000);
    expect(series.values[299999]).toBe((299999 % 997) / 10 / 100);
    expect(reasons.map((run) => run.from)).toEqual([123456 * MINUTE]);
    expect(seen.length).toBeGreaterThan(1);
    expect(seen).toEqual([...seen].sort((a, b) => a - b));
  });

  it('refuses a line of 100 MB before it has read two', async () => {
    let given = 0;
    async function* file(): AsyncGenerator<Uint8Array> {
      const piece = new Uint8Array(100000).fill(0x31);
      for (; given < 100000000; given += piece.length) yield await Promise.resolve(piece);
    }
    const refused = { code: 'LINE_TOO_LONG', path: 'line 1' };
    await expect(readGaugeCsv(file())).rejects.toMatchObject(refused);
    expect(given).toBeLessThan(2000000);
  });

  it('refuses it in one piece, too', async () => {
    const refused = { code: 'LINE_TOO_LONG', path: 'line 1' };
    const source = pieces(['1'.repeat(10000000)]);
    await expect(readGaugeCsv(source)).rejects.toMatchObject(refused);
  });

  it('stops with the reason of the signal and lets go of the stream', async () => {
    const control = new AbortController();
    let cancelled = false;
    const endless = {
      getReader: () => ({
        read: () => {
          control.abort(new Error('enough'));
          return Promise.resolve({ done: false, value: new Uint8Array(10).fill(10) });
        },
        cancel: () => {
          cancelled = true;
          return Promise.resolve();
        },
      }),
    };
    await expect(readGaugeCsv(endless, { signal: control.signal })).rejects.toThrow('enough');
    expect(cancelled).toBe(true);
  });

  it.each([[7], [null], [{}]])('refuses %j for a source', async (source) => {
    const refused = { code: 'WRONG_TYPE', path: 'source' };
    await expect(readGaugeCsv(source as unknown as Blob)).rejects.toMatchObject(refused);
  });

  it('refuses pieces that are neither text nor bytes', async () => {
    const source = pieces([7]) as unknown as AsyncGenerator<string>;
    await expect(readGaugeCsv(source)).rejects.toMatchObject({ code: 'WRONG_TYPE' });
  });
});

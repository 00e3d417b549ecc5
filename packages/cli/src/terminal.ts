/**
 * What reaches the terminal: results on standard output, everything else on standard error, all of it printable.
 * @module
 */
import type { LongWork } from '@staithe/core';
import { once } from 'node:events';
import { onOneLine, printable } from './printable.js';

/** Writes a result, waiting for a reader that is slow; a reader that has left is no fault. */
export async function print(text: string): Promise<void> {
  if (process.stdout.destroyed || process.stdout.writableEnded) return;
  if (!process.stdout.write(printable(text))) await once(process.stdout, 'drain');
}

/** Writes a line or more of what is said beside the result. */
export function remark(text: string): void {
  process.stderr.write(`${printable(text)}\n`);
}

const LABEL = 10; // characters

/** `read      94 210 of 94 896 samples`. */
export function row(label: string, text: string): string {
  return `${label.padEnd(LABEL)}${onOneLine(text)}\n`;
}

/** 94 210. */
export function count(n: number): string {
  return String(n).replace(/\B(?=(\d{3})+$)/g, '\u00a0');
}

/** `1 gap`, `14 gaps`. */
export function counted(n: number, one: string): string {
  return `${count(n)} ${one}${n === 1 ? '' : 's'}`;
}

/** Whole millimetres of metres. */
export function millimetres(metres: number): string {
  return count(Math.round(Math.abs(metres) * 1000));
}

/** Millimetres with their sign. */
export function signedMillimetres(metres: number): string {
  return `${metres < 0 ? '−' : '+'}${millimetres(metres)}`;
}

/** Progress of long work on standard error, only where that is a terminal. */
export function progress(): LongWork & { readonly done: () => void } {
  if (!process.stderr.isTTY) return { done: () => undefined };
  const began = Date.now();
  let shown = 0;
  const clear = (): void => {
    if (shown > 0) process.stderr.write('\r\u001b[K');
  };
  return {
    onProgress: ({ done, total, stage }) => {
      const now = Date.now();
      if (now - began < 300 || now - shown < 100) return;
      clear();
      shown = now;
      const much = total > 0 ? `${Math.floor((100 * done) / total)} %` : `${count(done)} so far`;
      process.stderr.write(`${stage.padEnd(2 * LABEL)}  ${much}`);
    },
    done: clear,
  };
}

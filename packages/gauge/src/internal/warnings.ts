/**
 * Soft findings, counted: the first one's line and how many there were.
 * @module
 */
import type { GaugeWarning, GaugeWarningCode } from '../record.js';

export interface WarningList {
  readonly add: (code: GaugeWarningCode, message: string, line?: number) => void;
  readonly list: () => readonly GaugeWarning[];
}

/** One entry a code and message. */
export function warningList(): WarningList {
  const found = new Map<string, { -readonly [K in keyof GaugeWarning]: GaugeWarning[K] }>();
  return {
    add(code, message, line) {
      const key = `${code} ${message}`;
      const entry = found.get(key);
      if (entry) entry.count++;
      else found.set(key, { code, message, count: 1, ...(line === undefined ? {} : { line }) });
    },
    list: () => [...found.values()],
  };
}

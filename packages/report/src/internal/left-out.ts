/**
 * What a fit left out, and why.
 * @module
 */
import type { FitDiagnostics } from '@staithe/fit';
import { cleanText } from './text.js';

/** `T2 (record too short beside S2 by 12 days), R2 (…)`; undefined where nothing was left out. */
export function leftOutText(
  diagnostics: Pick<FitDiagnostics, 'candidates'> | undefined,
): string | undefined {
  const left = (diagnostics?.candidates ?? []).filter(({ decision }) => decision === 'left');
  if (left.length === 0) return undefined;
  return left.map(({ name, reason }) => `${cleanText(name, 12)} (${cleanText(reason)})`).join(', ');
}

import { existsSync, readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { useCommand } from './command.js';
import { currentsCsv, PER_UNIT } from './currents-inputs.js';
import { recordCsv } from './inputs.js';

const { run, put, path } = useCommand();
const readme = readFileSync(new URL('../README.md', import.meta.url), 'utf8');

/** The words of a call: quotes hold words together. */
const wordsOf = (call: string): string[] =>
  (call.match(/"[^"]*"|\S+/g) ?? []).map((word) => word.replaceAll('"', '')).slice(1);

it('shows calls that work, in their order', async () => {
  put('quenby.csv', recordCsv());
  const heads = ['speed (kn)', 'towards (deg)'] as const;
  put('sound.csv', currentsCsv({ heads, as: 'directions', perUnit: PER_UNIT.kn }));
  const [, block = ''] = /```\n(staithe check [\s\S]*?)```/.exec(readme) ?? [];
  const lines = block.trimEnd().split('\n');
  expect(lines).toHaveLength(9);
  for (const line of lines) {
    let last = { code: 0 as number | null, out: '', err: '' };
    for (const call of line.split(' | ')) last = await run(wordsOf(call), last.out);
    // The record has a spike, so the checks say no.
    expect(last.code, `${line}\n${last.err}`).toBe(line.includes(' check ') ? 1 : 0);
    expect(last.out).toMatch(/\S/);
  }
  for (const name of ['quenby.constants.json', 'sound.currents.json', 'june.csv', 'quenby.html']) {
    expect(existsSync(path(name))).toBe(true);
  }
});

import { toInstant } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { caution } from '@staithe/report';
import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { useCommand } from './command.js';
import { CONSTANTS, CONSTANTS_JSON, recordCsv, SPIKE_AT } from './inputs.js';

const bench = useCommand();
const { run, put, path } = bench;
const JUNE = ['--from', '2031-06-01', '--until', '2031-06-03'];
let constants = '';
let record = '';
beforeAll(() => {
  constants = put('quenby.constants.json', CONSTANTS_JSON);
  record = put('quenby.csv', recordCsv());
});

describe.concurrent('check', () => {
  it('shows the runs and says no where samples fail', async () => {
    const { code, out } = await run(['check', record]);
    expect(code).toBe(1);
    expect(out).toMatch(/^read {6}4\u00a0315 of 4\u00a0320 samples, 5 missing in 1 gap\n/);
    expect(out).toMatch(/2030-01-10 12:00Z {2}2030-01-10 12:00Z {2}4 fail +spike/);
  });
  it('is content with a sound record, and reads standard input', async () => {
    const { code, out } = await run(['check', '-'], recordCsv({ spike: 0 }));
    expect(code).toBe(0);
    expect(out).toContain('flagged   0 runs that fail');
  });
  it('gives JSON with instants as text', async () => {
    const { out } = await run(['check', record, '--json']);
    const json = JSON.parse(out);
    expect(json.record).toMatchObject({
      samples: 4320,
      read: 4315,
      missing: 5,
      gaps: 1,
      unit: 'm',
    });
    expect(json.flags['4']).toBe(1);
    expect(json.runs.find((r: { flag: number }) => r.flag === 4)).toMatchObject({
      from: SPIKE_AT,
      to: SPIKE_AT,
      reason: 'spike',
    });
  });
  it('writes every sample with its flag', async () => {
    const { code } = await run(['check', record, '--write', 'flags.csv', '--against', constants]);
    expect(code).toBe(1);
    const lines = readFileSync(path('flags.csv'), 'utf8').trimEnd().split('\n');
    expect(lines).toHaveLength(4321);
    expect(lines[0]).toBe('instant_utc,height_m,flag,reason');
    expect(lines.find((line) => line.startsWith(SPIKE_AT))).toMatch(/,4,(spike|neighbour)$/);
    expect(lines.filter((line) => line.endsWith(',,9,gap'))).toHaveLength(5);
  });
});

describe.concurrent('fit', () => {
  it('prints the summary and the table and writes the constants', async () => {
    const named = [
      '--place',
      'Quenby Haven',
      '--datum',
      'chart datum',
      '--constituents',
      'M2,S2,K1,O1',
    ];
    const { code, out } = await run(['fit', record, ...named, '--write', 'fitted.json']);
    expect(code).toBe(0);
    expect(out).toMatch(/^read {6}4\u00a0315 of 4\u00a0320 samples/);
    expect(out).toMatch(/\nset aside 1 sample that fails; see staithe check\n/);
    expect(out).toMatch(/\nheld {6}4 lines: 4 firm\n/);
    expect(out).toMatch(/\nnot tide {2}\d+ mm typical, \d+ mm worst \(2030-/);
    expect(out).toContain('TWICE A DAY');
    expect(out).toMatch(/\nwrote {5}fitted\.json\n$/);
    const document = JSON.parse(readFileSync(path('fitted.json'), 'utf8'));
    expect(document).toMatchObject({ place: { name: 'Quenby Haven' }, datum: 'chart datum' });
    const m2 = document.constituents.find((c: { name: string }) => c.name === 'M2');
    // The record was predicted from 1.2 m and 93°, to the millimetre, with a ripple of 3 mm.
    expect(Math.abs(m2.amplitude - 1.2)).toBeLessThan(0.002);
    expect(Math.abs(m2.phaseLag - 93)).toBeLessThan(0.1);
  });
  it('gives JSON that predict takes', async () => {
    const fit = await run(['fit', record, '--json', '--constituents', 'M2,S2,K1,O1']);
    const json = JSON.parse(fit.out);
    expect(Object.keys(json)).toEqual([
      'constants',
      'diagnostics',
      'warnings',
      'leftOver',
      'setAside',
      'check',
      'caution',
    ]);
    expect(json.caution).toBe(caution('levels'));
    const waters = await run(['predict', '-', '--waters', ...JUNE], fit.out);
    expect(waters.code).toBe(0);
    expect(waters.out).toMatch(/^turning_at_utc,turns_from,height_m\n2031-06-01T/);
    const both = await run(['predict', '-', '--waters', '--every', '1h', ...JUNE], fit.out);
    expect(both.code).toBe(2);
    expect(both.out).toBe('');
    expect(both.err).toContain('--waters: expected it without --every, got both');
  });
  it('borrows by the rules it is given', async () => {
    const rules = ['--constituents', 'M2,S2,K1,O1', '--borrow', 'K2:S2:0.27:3.5,P1:K1:0.33:-1'];
    const { out } = await run(['fit', record, '--json', ...rules]);
    const { constituents } = JSON.parse(out).constants;
    const of = (name: string) => constituents.find((c: { name: string }) => c.name === name);
    expect(of('K2')).toMatchObject({ standing: 'borrowed', borrowedFrom: 'S2' });
    expect(Math.abs(of('K2').amplitude - 0.27 * of('S2').amplitude)).toBeLessThan(1e-12);
    expect(Math.abs(of('P1').phaseLag - of('K1').phaseLag + 1)).toBeLessThan(1e-9);
    expect((await run(['fit', record, ...rules])).out).toMatch(
      /held {6}6 lines: 4 firm, 2 borrowed/,
    );
  });
  const names = ['--constituents', 'M2,S2,K1,O1'];
  it('weighs what stands out less, and says how many samples', async () => {
    const resistant = ['--every-sample', '--weighting', 'resistant'];
    const { code, out } = await run(['fit', record, ...names, ...resistant]);
    expect(code).toBe(0);
    expect(out).toMatch(/\ndoubted {3}1 sample of less than half weight, 1 of none\n/);
    const json = JSON.parse((await run(['fit', record, ...names, ...resistant, '--json'])).out);
    const { scale, ...told } = json.resistant;
    expect(told).toEqual({ curve: 'biweight', cutoff: 8, doubted: 1, setAside: 1 });
    expect(scale).toBeGreaterThan(0);
    const amplitude = (fit: { constants: { constituents: { amplitude: number }[] } }): number =>
      (fit.constants.constituents[0] as { amplitude: number }).amplitude;
    const equal = JSON.parse(
      (await run(['fit', record, ...names, '--every-sample', '--json'])).out,
    );
    expect(equal.resistant).toBeUndefined();
    // The spike of 1.5 m pulls M2 when all samples weigh alike: by up to 2 · 1.5 m / 4315 samples.
    const without = JSON.parse((await run(['fit', record, ...names, '--json'])).out);
    const pull = Math.abs(amplitude(equal) - amplitude(without));
    expect(pull).toBeGreaterThan(2e-4);
    expect(Math.abs(amplitude(json) - amplitude(without))).toBeLessThan(pull / 10);
  });
  it('takes curve and cutoff, and says where nothing is doubted', async () => {
    const huber = ['--weighting', 'resistant', '--curve', 'huber', '--cutoff', '50'];
    const { out } = await run(['fit', record, ...names, ...huber]);
    expect(out).toMatch(/\ndoubted {3}no sample of less than half weight\n/);
    const json = JSON.parse((await run(['fit', record, ...names, ...huber, '--json'])).out);
    expect(json.resistant).toMatchObject({ curve: 'huber', cutoff: 50, doubted: 0 });
  });
  it('redraws what is left for the errors, the same for the same seed', async () => {
    const redrawn = ['--error-model', 'redrawn', '--redraw-by', 'blocks', '--draws', '20'];
    const call = (seed: string) => run(['fit', record, ...names, ...redrawn, '--seed', seed]);
    const [one, again, other] = [await call('7'), await call('7'), await call('8')];
    expect(one.code).toBe(0);
    expect(again.out).toBe(one.out);
    const disc = async (more: string[]): Promise<number> => {
      const { out } = await run(['fit', record, ...names, '--json', ...more]);
      return JSON.parse(out).constants.constituents[0].radius95;
    };
    expect(other.code).toBe(0);
    expect(await disc([...redrawn, '--seed', '7'])).not.toBe(
      await disc([...redrawn, '--seed', '8']),
    );
  });
  it('says no where the record holds no answer', async () => {
    const short = 'Time (UTC),Level (m)\n2031-01-01 00:00,1.2\n2031-01-01 01:00,1.4\n';
    const { code, err, out } = await run(['fit', '-', '--json'], short);
    expect(code).toBe(1);
    expect(JSON.parse(out).error.code).toBe('TOO_FEW_SAMPLES');
    expect(err).toMatch(/expected .*got /);
  });
});

describe.concurrent('predict', () => {
  it('gives the heights of the library as CSV, with the caution beside it', async () => {
    const { code, out, err } = await run(['predict', constants, ...JUNE, '--every', '1h']);
    expect(code).toBe(0);
    const lines = out.trimEnd().split('\n');
    expect(lines[0]).toBe('instant_utc,height_m');
    expect(lines).toHaveLength(49);
    const height = tideCurve(CONSTANTS).height('2031-06-01T05:00Z');
    expect(lines[6]).toBe(`2031-06-01T05:00Z,${height.toFixed(4)}`);
    expect(err).toContain('(UTC)');
    expect(err).toContain(caution('heights'));
  });
  it('joins pieces without a seam', async () => {
    const { out } = await run(['predict', constants, ...JUNE, '--every', '30s']);
    const lines = out.trimEnd().split('\n').slice(1);
    expect(lines).toHaveLength(5760);
    const times = lines.map((line) => toInstant(line.split(',')[0] as string));
    expect(times.every((t, i) => i === 0 || t - (times[i - 1] as number) === 30_000)).toBe(true);
  });
  it('reads dates as the start of local days, whatever zone the host has', async () => {
    const { out } = await run(['predict', constants, ...JUNE, '--zone', 'Europe/Lisbon', '--json']);
    const json = JSON.parse(out);
    expect(json).toMatchObject({
      from: '2031-05-31T23:00Z',
      until: '2031-06-02T23:00Z',
      zone: 'Europe/Lisbon',
      everySeconds: 600,
      unit: 'm',
    });
    expect(json.heights).toHaveLength(288);
    expect(json.caution).toBe(caution('heights'));
  });
});

describe.concurrent('table, levels, windows', () => {
  it('prints a month in local time', async () => {
    const zone = ['--zone', 'Europe/Lisbon'];
    const { code, out } = await run(['table', constants, '--month', '2031-03', ...zone]);
    expect(code).toBe(0);
    expect(out).toMatch(/^Quenby Haven {3}March 2031 {3}heights in m above chart datum/);
    expect(out).toContain('this day has 23 h');
    expect(out).toContain(caution('heights'));
    const json = JSON.parse(
      (await run(['table', constants, '--month', '2031-03', ...zone, '--json'])).out,
    );
    expect(json).toMatchObject({
      month: '2031-03',
      from: '2031-03-01T00:00Z',
      until: '2031-03-31T23:00Z',
    });
    expect(json.turningPoints.at(-1).local).toMatch(/^2031-03-31 \d\d:\d\d \+01:00$/);
    expect(json.caution).toBe(caution('heights'));
  });
  it('prints the ladder, with the mean waters of a record', async () => {
    const { code, out } = await run(['levels', constants, '--record', record]);
    expect(code).toBe(0);
    for (const name of ['HAT', 'MHWS', 'MHHW', 'MSL', 'LAT']) expect(out).toContain(` ${name} `);
    expect(out).toContain(caution('levels'));
    const json = JSON.parse((await run(['levels', constants, '--json'])).out);
    expect(json.limits.HAT.height).toBeGreaterThan(3.9);
    expect(json).toMatchObject({ tideClass: 'semidiurnal', datum: 'chart datum' });
    expect(json.caution).toBe(caution('levels'));
  });
  it('prints windows, and says no where there is none', async () => {
    const open = await run(['windows', constants, '--above', '3', ...JUNE, '--json']);
    expect(open.code).toBe(0);
    const json = JSON.parse(open.out);
    expect(json.above).toBe(3);
    const curve = tideCurve(CONSTANTS);
    for (const { opens, closes, minutes } of json.windows) {
      // Minutes are given to a tenth: 3 s either way.
      const long = toInstant(closes) - toInstant(opens);
      expect(Math.abs(long - minutes * 60_000)).toBeLessThanOrEqual(3000);
      expect(curve.height((toInstant(opens) + toInstant(closes)) / 2)).toBeGreaterThan(3);
    }
    expect(json.caution).toBe(caution('windows'));
    const shut = await run(['windows', constants, '--above', '9', ...JUNE]);
    expect(shut.code).toBe(1);
    expect(shut.out).toContain('no window');
    expect(shut.out).toContain(caution('windows'));
  });
});

describe.concurrent('report', () => {
  it('marks what a resistant fit doubted, and says where errors come from', async () => {
    const asked = ['--constituents', 'M2,S2,K1,O1', '--every-sample', '--weighting', 'resistant'];
    const redrawn = ['--error-model', 'redrawn', '--draws', '20'];
    const { code, out } = await run(['report', record, ...asked, ...redrawn]);
    expect(code).toBe(0);
    expect(out).toContain('The fit gave 1 sample less than half weight, 1 of them none.');
    expect(out).toContain('less than half weight in the fit: 1 sample<');
    expect(out).toMatch(/>resistant \(biweight\): falling to none at 8 scales of [\d.]+ mm</);
    expect(out).toContain('the fit repeated on what is not tide, redrawn');
    const plain = await run(['report', record, '--constituents', 'M2,S2,K1,O1']);
    expect(plain.out).not.toContain('half weight');
    expect(plain.out).toContain('the noise beside each line in the spectrum');
  });
  it('writes one page of the record that answers all questions', async () => {
    const options = [
      '--place',
      'Quenby Haven',
      '--above',
      '3',
      '--month',
      '2031-06',
      '--zone',
      'Europe/Lisbon',
    ];
    const { code, out, err } = await run(['report', record, ...options, '--write', 'quenby.html']);
    expect(code).toBe(0);
    expect(out).toMatch(/\nwrote {5}quenby\.html\n$/);
    expect(err).toContain(caution('heights'));
    const page = readFileSync(path('quenby.html'), 'utf8');
    expect(page).toMatch(/^<!doctype html>/);
    for (let question = 1; question <= 7; question++)
      expect(page).toContain(`id="question-${question}"`);
    for (const kind of ['heights', 'windows', 'levels'] as const)
      expect(page).toContain(caution(kind));
  });
});

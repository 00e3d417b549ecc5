import { readdirSync } from 'node:fs';
import * as predict from '@staithe/predict';
import { describe, expect, it } from 'vitest';
import * as everyday from '../src/index.js';
import * as subpath from '../src/predict.js';

describe('the umbrella', () => {
  it('gives the everyday functions by name, the very ones of the packages', () => {
    expect(Object.keys(everyday).length).toBeLessThanOrEqual(24);
    expect(everyday.tideCurve).toBe(predict.tideCurve);
    for (const name of [
      'fitHarmonics',
      'tideCurve',
      'parseGaugeCsv',
      'harmonicLevels',
      'reportHtml',
    ]) {
      expect(everyday).toHaveProperty(name);
    }
  });

  it('has a subpath for each package that gives all of it', () => {
    expect(Object.keys(subpath).sort()).toEqual(Object.keys(predict).sort());
    const files = readdirSync(new URL('../src', import.meta.url)).filter(
      (file) => file !== 'index.ts',
    );
    expect(files.length).toBe(10);
  });

  it('does the job from end to end', () => {
    const rows = Array.from({ length: 40 * 24 }, (_, i) => {
      const time = new Date(Date.UTC(2031, 0, 1) + i * 3600000).toISOString();
      return `${time},${(2 + Math.cos((28.9841042 * i * Math.PI) / 180)).toFixed(3)}`;
    });
    const { series } = everyday.parseGaugeCsv(`time,height (m)\n${rows.join('\n')}\n`);
    const fit = everyday.fitHarmonics(series, { constituents: ['M2', 'S2'], nodalModel: 'none' });
    const m2 = fit.constants.constituents[0];
    expect(m2?.amplitude).toBeGreaterThan(0.999);
    const waters = everyday
      .tideCurve(fit.constants)
      .turningPoints({ from: '2031-03-01T00:00Z', to: '2031-03-02T00:00Z' });
    expect(waters.length).toBeGreaterThanOrEqual(3);
  });
});

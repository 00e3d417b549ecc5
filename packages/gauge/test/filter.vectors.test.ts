/**
 * Published filters: their weights, and what they leave of six constituents.
 */
import { expectWithin, loadVector, recordAccuracy } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { doodsonWeights, filterResponse, godinWeights } from '../src/index.js';

interface Response {
  readonly name: string;
  readonly speed: number;
  readonly response: number;
  readonly within: number;
}
interface Cases {
  readonly doodsonX0: {
    readonly halfWeightsTimes30: readonly number[];
    readonly responses: readonly Response[];
  };
  readonly godin: { readonly lengths: readonly number[]; readonly responses: readonly Response[] };
}

const { cases } = loadVector<Cases>('filter-responses');

describe.each([
  ['Doodson X0', doodsonWeights(), cases.doodsonX0.responses],
  ['Godin 24.24.25', godinWeights(), cases.godin.responses],
] as const)('%s', (title, weights, responses) => {
  it.each(responses)('leaves the printed share of $name', ({ name, speed, response, within }) => {
    const seen = expectWithin(filterResponse(weights, 1, speed), response, { abs: within }, name);
    recordAccuracy('filter-responses', {
      capability: `response of ${title} at ${name}`,
      compared: 'the printed response',
      ...seen,
      tolerance: within,
      unit: '1',
    });
  });

  it('is symmetrical and leaves a level as it is', () => {
    expect([...weights].reverse()).toEqual([...weights]);
    expectWithin(filterResponse(weights, 1, 0), 1, { abs: 1e-14 });
  });
});

it('has the printed half weights', () => {
  const half = [...doodsonWeights()].slice(0, 19).map((weight) => Math.round(weight * 30));
  expect(half).toEqual(cases.doodsonX0.halfWeightsTimes30);
});

it('is as long as the three running means together', () => {
  const { lengths } = cases.godin;
  expect(godinWeights().length).toBe(lengths.reduce((a, b) => a + b, 0) - lengths.length + 1);
});

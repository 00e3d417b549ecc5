/**
 * Grand Isle 1980 to 2016 in monthly chunks, shuffled, merged from four parts, against the fit in one piece: constants after
 * the first pass, error bars after the second, and what memory a part takes.
 */
import { DAY, uniformSeries } from '@staithe/core';
import {
  accumulate,
  finishErrors,
  finishFit,
  fitHarmonics,
  mergePartials,
  mergeResidualPartials,
  planFit,
  residualPass,
} from '@staithe/fit';
import { hourlySeries } from '@staithe/test-vectors';
import { recordLong } from '../accuracy/long.mjs';

const record = hourlySeries('grand-isle-observed');
const MONTH = (30 * DAY) / record.step;
const whole = fitHarmonics(record, { secularRate: true });
const constituents = whole.constants.constituents.map(({ name }) => name);
const options = { constituents, secularRate: true };
const alone = fitHarmonics(record, options);

const places = [];
for (let at = 0; at < record.values.length; at += MONTH) places.push(at);
const shuffled = places.map((_, i) => places[(i * 101) % places.length]);
const chunkAt = (at) =>
  uniformSeries({
    start: record.start + at * record.step,
    step: record.step,
    values: record.values.slice(at, at + MONTH),
  });
const quarters = [0, 1, 2, 3].map((q) => shuffled.filter((_, i) => i % 4 === q));
const plan = planFit(options);
const inParts = (take, merge) =>
  quarters.map((places) => places.map((at) => take(chunkAt(at))).reduce(merge)).reduce(merge);

globalThis.gc?.();
const before = process.memoryUsage().heapUsed;
let most = 0;
const watched = (take) => (chunk) => {
  const out = take(chunk);
  most = Math.max(most, process.memoryUsage().heapUsed - before);
  return out;
};
const first = inParts(
  watched((chunk) => accumulate(plan, chunk)),
  mergePartials,
);
const provisional = finishFit(plan, first);
const second = inParts(
  watched((chunk) => residualPass(plan, provisional, chunk)),
  mergeResidualPartials,
);
const fit = finishErrors(plan, provisional, second);

const pairs = (constants) =>
  constants.constituents.flatMap(({ amplitude, phaseLag }) => {
    const angle = (phaseLag * Math.PI) / 180;
    return [amplitude * Math.cos(angle), amplitude * Math.sin(angle)];
  });
const sizes = alone.constants.constituents.flatMap(({ amplitude }) => [amplitude, amplitude]);
const relative = (of) =>
  pairs(of.constants).map((value, i) => Math.abs(value - pairs(alone.constants)[i]) / sizes[i]);
const errors = (of) => of.constants.constituents.flatMap((c) => [c.amplitudeSigma, c.radius95]);
const errorOff = errors(fit).map((value, i) => Math.abs(value / errors(alone)[i] - 1));
const spread = (values) => ({
  cases: values.length,
  worst: Math.max(...values),
  typical: [...values].sort((a, b) => a - b)[values.length >> 1],
});
const passes = { first: spread(relative(provisional)), second: spread(relative(fit)) };
console.log(
  passes,
  spread(errorOff),
  `${places.length} chunks, heap grew by ${(most / 1e6).toFixed(0)} MB at most`,
);
const common = { package: 'fit', vector: 'grand-isle-observed', unit: '1' };
const compared = `one piece; ${places.length} monthly chunks, shuffled, merged from four parts`;
recordLong({
  ...common,
  capability: 'constants of a fit in parts, over the amplitude',
  compared,
  ...passes.first,
  tolerance: 1e-10,
});
recordLong({
  ...common,
  capability: 'error bars of a fit in parts after the second pass',
  compared,
  ...spread(errorOff),
  tolerance: 1e-6,
});

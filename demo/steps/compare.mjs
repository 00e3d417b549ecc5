/**
 * What was found against what the generator knows.
 * @module
 */
import { degreesToRadians } from '@staithe/core';
import { millimetres, moment, signed, under } from './terminal.mjs';

const at = (text) => Date.parse(text);

/** Says which faults of the truth were found. */
export function compareFaults(record, check, { faults }) {
  const { series } = record;
  const timeOf = (i) => (series.times ? series.times[i] : series.start + i * series.step);
  const of = (kind) => faults.filter((fault) => fault.kind === kind);
  const failed = new Set();
  check.flags.forEach((flag, i) => {
    if (flag === 4) failed.add(timeOf(i));
  });
  const spikes = of('spike');
  const seen = spikes.filter((spike) => failed.has(at(spike.at)));
  under(`found ${seen.length} of ${spikes.length} spikes, ${gapsFound(record, of('gap'))}`);
  for (const { from, to } of of('stuck')) {
    const hit = check.reasons.find(
      (run) =>
        run.reason === 'flat line' && run.flag === 4 && run.from < at(to) && run.to >= at(from),
    );
    under(
      hit
        ? `found the stuck sensor: ${moment(hit.from)} to ${moment(hit.to)} (truth: ${moment(at(from))} until ${moment(at(to))})`
        : 'did not find the stuck sensor',
    );
  }
  const bad = (t) =>
    spikes.some((spike) => at(spike.at) === t) ||
    of('stuck').some(({ from, to }) => t >= at(from) && t < at(to));
  const wrongly = [...failed].filter((t) => !bad(t)).length;
  under(`${wrongly} sound samples failed with them`);
}

function gapsFound(record, gaps) {
  const found = gaps.filter((gap) =>
    record.reasons.some((run) => run.from === at(gap.from) && run.samples === gap.missing),
  );
  return `${found.length} of ${gaps.length} gaps`;
}

const NEAR = 12 * 3_600_000; // a step that is dated to half a day is found

/** Says which steps of the zero were found. */
export function compareSteps(moved, { faults }) {
  const steps = faults.filter(({ kind }) => kind === 'step');
  for (const step of steps) {
    const hit = moved.find((finding) => Math.abs(finding.at - at(step.at)) <= NEAR);
    const truth = `${signed(step.change)} mm on ${moment(at(step.at))}`;
    under(
      hit
        ? `zero moved ${signed(hit.change)} ± ${millimetres(hit.sigma)} mm on ${moment(hit.at)} (truth: ${truth})`
        : `did not find that the zero moved ${truth}`,
    );
  }
  for (const { at: when, change, sigma } of moved) {
    if (steps.some((step) => Math.abs(when - at(step.at)) <= NEAR)) continue;
    under(
      `doubts the zero where it did not move: ${signed(change)} ± ${millimetres(sigma)} mm on ${moment(when)}`,
    );
  }
}

/** Distance of two constituents in the plane of (H cos G, H sin G), metres. */
function apart(a, b) {
  const angle = degreesToRadians(a.phaseLag - b.phaseLag);
  return Math.sqrt(
    a.amplitude ** 2 + b.amplitude ** 2 - 2 * a.amplitude * b.amplitude * Math.cos(angle),
  );
}

/** A table of the main constituents: found, true, how far apart, and how far they may be. */
export function compareConstants(constants, truth, names) {
  under('line    H, mm  truth    G, °  truth   apart, mm  95 % disc, mm');
  for (const name of names) {
    const found = constants.constituents.find((c) => c.name === name);
    const known = truth.constituents.find((c) => c.name === name);
    if (!found || !known) continue;
    under(
      [
        name.padEnd(4),
        millimetres(found.amplitude, 1).padStart(9),
        millimetres(known.amplitude, 1).padStart(7),
        found.phaseLag.toFixed(1).padStart(8),
        known.phaseLag.toFixed(1).padStart(7),
        millimetres(apart(found, known), 1).padStart(12),
        millimetres(found.radius95 ?? Number.NaN, 1).padStart(15),
      ].join(''),
    );
  }
  const inside = truth.constituents.flatMap((known) => {
    const found = constants.constituents.find((c) => c.name === known.name);
    return found?.radius95 === undefined ? [] : [apart(found, known) <= found.radius95];
  });
  under(
    `the truth lies in the 95 % disc of ${inside.filter(Boolean).length} of ${inside.length} lines`,
  );
}

const LEAST = 0.005; // metres

/** A complaint where a constituent is further from the truth than 3 of its sigma and 5 mm. */
export function complain(place, constants, truth, name) {
  const found = constants.constituents.find((c) => c.name === name);
  const known = truth.constituents.find((c) => c.name === name);
  if (!found || !known) return [`${place}: expected ${name} among the constants, got none`];
  const across = found.amplitude * degreesToRadians(found.phaseLagSigma ?? 0);
  const sigma = Math.sqrt(((found.amplitudeSigma ?? 0) ** 2 + across ** 2) / 2);
  const distance = apart(found, known);
  if (distance <= Math.max(3 * sigma, LEAST)) return [];
  const expected = `expected ${name} within 3 sigma (${millimetres(3 * sigma, 1)} mm) or 5 mm of the truth`;
  return [`${place}: ${expected}, got ${millimetres(distance, 1)} mm`];
}

/** Root mean square and mean of the difference of two series of heights. */
export function difference(heights, truth) {
  let sum = 0;
  let squares = 0;
  heights.forEach((height, i) => {
    const off = height - truth[i];
    sum += off;
    squares += off * off;
  });
  const mean = sum / heights.length;
  return { mean, rms: Math.sqrt(squares / heights.length - mean * mean) };
}

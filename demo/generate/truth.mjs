/**
 * What the generator knows and the analyst must find out, as a plain JSON document.
 * @module
 */
import { trueConstants } from './true-constants.mjs';

const iso = (instant) => new Date(instant).toISOString().replace('.000Z', 'Z');
const millimetres = (metres) => Math.round(metres * 1000) / 1000;

/** Every instant of an event as ISO 8601 text. */
function dated(event) {
  return Object.fromEntries(
    Object.entries(event).map(([key, value]) => [
      key,
      key === 'from' || key === 'to' || key === 'at' ? iso(value) : value,
    ]),
  );
}

/** Root mean square and largest size of what is not tide, before the faults, metres. */
function sizeOf(notTide) {
  const squares = notTide.reduce((sum, value) => sum + value * value, 0);
  const largest = notTide.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  return { rms: millimetres(Math.sqrt(squares / notTide.length)), largest: millimetres(largest) };
}

/** @param {Float64Array} notTide Clean level less tide. @param {Float64Array} written What the file holds, NaN without a row. */
export function describeTruth(place, lines, schedule, { spikes, seiches, notTide, written }) {
  const faults = [
    ...schedule.gaps.map((gap) => ({
      kind: 'gap',
      ...dated(gap),
      missing: Math.round((gap.to - gap.from) / place.step),
    })),
    ...spikes.map((spike) => ({ kind: 'spike', ...dated(spike) })),
    ...schedule.stuck.map((run) => ({ kind: 'stuck', ...dated(run) })),
    ...schedule.steps.map((step) => ({ kind: 'step', ...dated(step) })),
  ];
  return {
    about:
      'Invented: no such place exists. Heights in metres above the datum of the file, times UTC, phase lags Greenwich, degrees.',
    place: {
      name: place.name,
      latitude: place.latitude,
      longitude: place.longitude,
      timeZone: place.timeZone,
    },
    record: {
      from: iso(place.from),
      to: iso(place.until),
      stepMinutes: place.step / 60_000,
      samples: written.length,
      written: written.reduce((count, value) => (Number.isNaN(value) ? count : count + 1), 0),
    },
    meanLevel: place.meanLevel,
    constituents: trueConstants(place, lines),
    noise: { ...sizeOf(notTide), semidiurnalUnrest: place.semidiurnalUnrest, ...place.weather },
    faults,
    events: [
      ...schedule.storms.map((storm) => ({ kind: 'storm', ...dated(storm) })),
      ...seiches.map((seiche) => ({ kind: 'seiche', ...dated(seiche) })),
    ],
  };
}

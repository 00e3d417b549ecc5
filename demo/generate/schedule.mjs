/**
 * What goes wrong, and when: written down by hand, so that the truth can be read here. Spikes and seiches alone are drawn by lot.
 * Times are UTC; a span begins at its time and ends before its last.
 * @module
 */

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

/** @param {string} time @param {number} length Milliseconds. */
function span(time, length) {
  const from = Date.parse(time);
  return { from, to: from + length };
}

/** Faults of the harbour's record: 14 gaps, from one sample to nine days. */
export const HARBOUR_SCHEDULE = {
  gaps: [
    span('2029-11-09T13:24Z', 6 * MINUTE),
    span('2029-12-02T04:00Z', 48 * MINUTE),
    span('2029-12-21T22:12Z', 4 * HOUR),
    span('2030-01-11T09:30Z', 12 * MINUTE),
    span('2030-01-24T17:00Z', 20 * HOUR),
    span('2030-02-22T06:06Z', 90 * MINUTE),
    span('2030-03-12T11:00Z', 9 * DAY),
    span('2030-04-17T02:18Z', 18 * MINUTE),
    span('2030-06-05T15:42Z', 150 * MINUTE),
    span('2030-06-28T07:00Z', 52 * HOUR),
    span('2030-07-30T19:54Z', 30 * MINUTE),
    span('2030-08-20T10:00Z', 11 * HOUR),
    span('2030-10-13T00:36Z', 7 * HOUR),
    span('2030-11-03T08:00Z', 4 * DAY),
  ],
  stuck: [span('2030-05-14T08:00Z', 2 * DAY)],
  steps: [{ at: Date.parse('2030-09-18T10:30Z'), change: 0.08 }],
  storms: [{ ...span('2030-02-02T04:00Z', 2 * DAY), height: 0.9, pressureFall: 40 }],
  spikes: 25,
  seiches: 18,
};

/** Faults of the lagoon's record: few, for a quieter life. */
export const LAGOON_SCHEDULE = {
  gaps: [
    span('2030-01-19T05:00Z', 5 * HOUR),
    span('2030-05-02T14:00Z', 31 * HOUR),
    span('2030-08-23T09:00Z', 6 * DAY),
  ],
  stuck: [],
  steps: [],
  storms: [],
  spikes: 4,
  seiches: 0,
};

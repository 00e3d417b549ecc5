/**
 * Stretches of time on which the functions of a basis are a slow cubic times a constant speed:
 * z_j(t) = Q_j(x)·e^{iσ_j(t − from)}, x = (t − from)/(to − from).
 *
 * Q carries f, u and the departure of V from constant speed: all of it slow (periods of 3 years and more). It is exact
 * on nodes two days apart, whose places do not depend on the span asked for, and Hermite between them with slopes from
 * five nodes, so z and z′ are continuous; docs/basis.md derives the error, below 1e-10 of the slow part's amplitude.
 * In `calendar-year` a stretch is a UTC year: V on 1 January, f and u on 2 July 12:00, constant speeds.
 * @module
 */
import { lunisolarLongitudesInto } from '@staithe/arguments';
import { DAY, degreesToRadians, HOUR, type Instant, wrapDegrees } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';
import { nodalPhasorsInto } from '@staithe/nodal';
import type { Basis } from './basis.js';

/** A stretch of smooth time. @public */
export interface Stretch {
  readonly from: Instant;
  readonly to: Instant;
  /** Whether the functions may jump at `from` and `to` (joins of calendar years). */
  readonly jumps: boolean;
  /** Eight numbers a constituent: Re and Im of the cubic's coefficients, ascending. */
  readonly cubics: Float64Array;
}

/** Gives the stretch that holds an instant; remembers the last one. @public */
export type Stretcher = (t: Instant) => Stretch;

const NODE = 2 * DAY;
const BEFORE = 2; // nodes needed before a stretch
const NODES = 6;
// M1 in official yearly tables: V on 1 January without p, so p is taken off again there (docs/conventions.md).
const M1 = 'M1';

/** f·e^{i(V + u)}, response included, of all constituents: pairs Re, Im. */
function phasorsInto(
  basis: Basis,
  argumentsAt: Float64Array,
  nodal: Float64Array,
  out: Float64Array,
): void {
  const pair = new Float64Array(2);
  const { multipliers, turns, response } = basis;
  for (let j = 0; j < turns.length; j++) {
    let v = turns[j] as number;
    for (let i = 0; i < 6; i++)
      v += (multipliers[6 * j + i] as number) * (argumentsAt[i] as number);
    sinCosInto(degreesToRadians(wrapDegrees(v)), pair);
    const weight = response[j] as number;
    const [s, c] = [(pair[0] as number) * weight, (pair[1] as number) * weight];
    const [re, im] = [nodal[2 * j] as number, nodal[2 * j + 1] as number];
    out[2 * j] = re * c - im * s;
    out[2 * j + 1] = re * s + im * c;
  }
}

function nodeInto(basis: Basis, node: number, scratch: Float64Array, out: Float64Array): void {
  const six = new Float64Array(6);
  lunisolarLongitudesInto(node * NODE, basis.argumentModel, six);
  if (basis.hold === 'held') scratch.set(basis.held);
  else nodalPhasorsInto(basis.nodal, six[3] as number, six[4] as number, scratch);
  phasorsInto(basis, six, scratch, out);
}

/** e^{−iσ·NODE·k} for k = −2 … 3: turns the phasor of a node into the frame of the stretch's first node. */
function frameTurns(basis: Basis): Float64Array {
  const count = basis.speeds.length;
  const out = new Float64Array(2 * NODES * count);
  const pair = new Float64Array(2);
  for (let k = 0; k < NODES; k++) {
    for (let j = 0; j < count; j++) {
      sinCosInto(-(basis.speeds[j] as number) * NODE * (k - BEFORE), pair);
      out[2 * (k * count + j)] = pair[1] as number;
      out[2 * (k * count + j) + 1] = pair[0] as number;
    }
  }
  return out;
}

function cubicsFrom(
  nodes: readonly Float64Array[],
  frames: Float64Array,
  count: number,
): Float64Array {
  const cubics = new Float64Array(8 * count);
  const q = new Float64Array(2 * NODES);
  for (let j = 0; j < count; j++) {
    for (let k = 0; k < NODES; k++) {
      const [re, im] = [
        (nodes[k] as Float64Array)[2 * j] as number,
        (nodes[k] as Float64Array)[2 * j + 1] as number,
      ];
      const at = 2 * (k * count + j);
      const [c, s] = [frames[at] as number, frames[at + 1] as number];
      q[k] = re * c - im * s;
      q[NODES + k] = re * s + im * c;
    }
    for (let part = 0; part < 2; part++) {
      const at = part * NODES + BEFORE;
      const value = (k: number): number => q[at + k] as number;
      const slope = (k: number): number =>
        (8 * (value(k + 1) - value(k - 1)) - (value(k + 2) - value(k - 2))) / 12;
      const [a, b, u, v] = [value(0), value(1), slope(0), slope(1)];
      cubics[8 * j + part] = a;
      cubics[8 * j + 2 + part] = u;
      cubics[8 * j + 4 + part] = 3 * (b - a) - 2 * u - v;
      cubics[8 * j + 6 + part] = 2 * (a - b) + u + v;
    }
  }
  return cubics;
}

function calendarYear(basis: Basis, t: Instant): Stretch {
  const year = new Date(t).getUTCFullYear();
  const from = Date.UTC(year, 0, 1);
  const six = new Float64Array(6);
  const count = basis.speeds.length;
  const nodal = new Float64Array(2 * count);
  lunisolarLongitudesInto(Date.UTC(year, 6, 2) + 12 * HOUR, basis.argumentModel, six);
  nodalPhasorsInto(basis.nodal, six[3] as number, six[4] as number, nodal);
  const perigeeMidYear = six[3] as number;
  lunisolarLongitudesInto(from, basis.argumentModel, six);
  const out = new Float64Array(2 * count);
  phasorsInto(basis, six, nodal, out);
  const cubics = new Float64Array(8 * count);
  for (let j = 0; j < count; j++) {
    let [re, im] = [out[2 * j] as number, out[2 * j + 1] as number];
    const m1 = basis.nodal.rules.find((rule) => rule.name === M1 && rule.formula);
    if (m1 && basis.names[j] === M1) {
      // u = ξ − ν + Q − p holds p of 2 July; the table's hold has p of 1 January in V and u alike.
      const pair = new Float64Array(2);
      sinCosInto(degreesToRadians(wrapDegrees(perigeeMidYear - (six[3] as number))), pair);
      [re, im] = [
        re * (pair[1] as number) - im * (pair[0] as number),
        re * (pair[0] as number) + im * (pair[1] as number),
      ];
    }
    cubics[8 * j] = re;
    cubics[8 * j + 1] = im;
  }
  return { from, to: Date.UTC(year + 1, 0, 1), jumps: true, cubics };
}

/**
 * Makes the function that gives the stretch of an instant. It remembers its last stretch and the nodes of it, so going
 * forward in time costs one node a stretch.
 *
 * @param basis - Of `makeBasis`.
 * @returns A function of an instant.
 * @example
 * makeStretcher(makeBasis({ constituents: ['M2'] }))(0).to; // 172800000
 * @public
 */
export function makeStretcher(basis: Basis): Stretcher {
  let last: Stretch | undefined;
  if (basis.hold === 'calendar-year') {
    return (t) => {
      if (!last || t < last.from || t >= last.to) last = calendarYear(basis, t);
      return last;
    };
  }
  const count = basis.speeds.length;
  const frames = frameTurns(basis);
  const scratch = new Float64Array(2 * count);
  let nodes: Float64Array[] = [];
  let firstNode = Number.NaN;
  return (t) => {
    if (last && t >= last.from && t < last.to) return last;
    const node = Math.floor(t / NODE);
    const moved = node - BEFORE - firstNode;
    const kept = moved > 0 && moved < NODES ? nodes.slice(moved) : [];
    for (let k = kept.length; k < NODES; k++) {
      const phasors = new Float64Array(2 * count);
      nodeInto(basis, node - BEFORE + k, scratch, phasors);
      kept.push(phasors);
    }
    nodes = kept;
    firstNode = node - BEFORE;
    last = {
      from: node * NODE,
      to: (node + 1) * NODE,
      jumps: false,
      cubics: cubicsFrom(nodes, frames, count),
    };
    return last;
  };
}

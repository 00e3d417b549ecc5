/**
 * Side-lines of the nodal cycle left free: in a record of 18.6 years and more the lines of a constituent's group that differ in
 * N′ part from it, so that the nodal factor is found from the record and compared with the potential's.
 *
 * The group stands for H·Σ ratio·cos(V + ΔN′·N′ − G). A freed line becomes a column pair of its own and leaves the group;
 * its amplitude over H, and its lag less G, are then the record's word on ratio and turn.
 * @module
 */
import type { Basis } from '@staithe/basis';
import type { Constituent } from '@staithe/constituents';
import { degreesToRadians, InputError, radiansToDegrees, wrapDegrees, YEAR } from '@staithe/core';
import { atan2, cos, sin } from '@staithe/core/trig';
import { type SideLine, sideLines } from '@staithe/nodal';
import { namedAt } from './read-options.js';
import type { RecordSummary } from './record.js';
import type { FitOptions, SideLineResult } from './types.js';

const CYCLE = 18.613 * YEAR; // of the node
const LEAVE = 0.97;
const SMALLEST = 0.01; // of the main line: smaller side-lines stay in the group

/** A line that is freed, as a constituent of its own. */
export interface FreeLine {
  readonly of: Constituent;
  readonly line: SideLine;
  readonly column: Constituent;
}

function freeable(of: Constituent, latitude: number | undefined): SideLine[] {
  return sideLines(of, { latitude }).lines.filter(
    ({ degree, perigee, node, ratio }) =>
      degree === 2 && perigee === 0 && node !== 0 && Math.abs(ratio) >= SMALLEST,
  );
}

/** The lines that the options free. */
export function readSideLines(options: FitOptions, record: RecordSummary): FreeLine[] {
  const { sideLines: names, nodalModel = 'potential', nodalHold } = options;
  if (names === undefined || names.length === 0) return [];
  const path = 'options.sideLines';
  if (nodalModel !== 'potential') {
    throw new InputError(
      'CONFLICT',
      path,
      `expected the model potential beside them, got ${nodalModel}`,
    );
  }
  if (nodalHold !== undefined && nodalHold !== 'continuous') {
    throw new InputError(
      'CONFLICT',
      path,
      'expected nodalHold continuous beside them, got a held one',
    );
  }
  if (record.to - record.from < LEAVE * CYCLE) {
    const years = ((record.to - record.from) / YEAR).toFixed(1);
    throw new InputError(
      'OUT_OF_RANGE',
      path,
      `expected a record of 18.6 years, got ${years} years`,
    );
  }
  return names.flatMap((name, i) => {
    const of = namedAt(name, `${path}[${i}]`);
    const lines = freeable(of, options.place?.latitude);
    if (names.indexOf(name) !== i) {
      throw new InputError('DUPLICATE', `${path}[${i}]`, `expected each once, got ${name} again`);
    }
    if (lines.length === 0) {
      const text = `expected a constituent with side-lines of the node from ${SMALLEST} on, got ${name}`;
      throw new InputError('MISSING', `${path}[${i}]`, text);
    }
    return lines.map((line) => {
      const [n1, n2, n3, n4, n5, n6] = of.doodsonNumbers;
      const sign = line.node > 0 ? '+' : '−';
      const column: Constituent = {
        ...of,
        name: `${of.name} (N′ ${sign} ${Math.abs(line.node)})`,
        doodsonNumbers: [n1, n2, n3, n4, n5 + line.node, n6],
        kind: 'meteorological', // a single line: f = 1, u = 0
        composition: undefined,
      };
      return { of, line, column };
    });
  });
}

/** The basis with the freed lines taken out of the groups they come from. Compounds keep the whole group. */
export function withoutFreed(basis: Basis, freed: readonly FreeLine[]): Basis {
  if (freed.length === 0) return basis;
  const rules = [...basis.nodal.rules];
  const factors = [...basis.nodal.factors];
  for (const name of new Set(freed.map(({ of }) => of.name))) {
    const nodes = freed.filter(({ of }) => of.name === name).map(({ line }) => line.node);
    const place = basis.names.indexOf(name);
    const rows = rules[factors[place]?.[0]?.[0] ?? -1]?.lines;
    if (place < 0 || !rows) continue;
    const kept: number[] = [];
    for (let at = 0; at < rows.length; at += 4) {
      const isFreed =
        rows[at] === 0 && nodes.includes(rows[at + 1] as number) && rows[at + 3] === 0;
      if (!isFreed) kept.push(...rows.slice(at, at + 4));
    }
    factors[place] = [[rules.push({ name, lines: Float64Array.from(kept) }) - 1, 1]];
  }
  return { ...basis, nodal: { ...basis.nodal, rules, factors } };
}

/** Half the distance between the largest and the smallest |1 + Σ ratio·e^{i(k·N′ + turn)}|. */
function swingOf(lines: readonly { node: number; re: number; im: number }[]): number {
  let least = Infinity;
  let most = 0;
  for (let node = 0; node < 360; node++) {
    let re = 1;
    let im = 0;
    for (const line of lines) {
      const angle = degreesToRadians(wrapDegrees(line.node * node));
      const [c, s] = [cos(angle), sin(angle)];
      re += line.re * c - line.im * s;
      im += line.re * s + line.im * c;
    }
    const f = Math.sqrt(re * re + im * im);
    least = Math.min(least, f);
    most = Math.max(most, f);
  }
  return (most - least) / 2;
}

/** Coefficients H cos G, H sin G and their mean variance, of a column pair by name. */
export type PairReader = (name: string) => { a: number; b: number; variance: number };

/** What the record says of the freed lines. */
export function sideLineResults(freed: readonly FreeLine[], read: PairReader): SideLineResult[] {
  const names = [...new Set(freed.map(({ of }) => of.name))];
  return names.map((name) => {
    const main = read(name);
    const h2 = main.a * main.a + main.b * main.b;
    const lines = freed
      .filter(({ of }) => of.name === name)
      .map(({ line, column }) => {
        const side = read(column.name);
        // (a − ib) of the side-line over (a − ib) of the main line, both H·e^{−iG}.
        const re = (side.a * main.a + side.b * main.b) / h2;
        const im = (side.a * main.b - side.b * main.a) / h2;
        const ratioSigma = Math.sqrt((side.variance + (re * re + im * im) * main.variance) / h2);
        return { line, column, re, im, ratioSigma };
      });
    const theory = lines.map(({ line }) => ({ node: line.node, re: line.ratio, im: 0 }));
    const estimated = lines.map(({ line, re, im }) => ({ node: line.node, re, im }));
    const swingSigma = Math.sqrt(
      lines.reduce((sum, one) => sum + one.ratioSigma * one.ratioSigma, 0),
    );
    return {
      name,
      swing: swingOf(estimated),
      swingSigma,
      swingTheory: swingOf(theory),
      lines: lines.map(({ line, column, re, im, ratioSigma }) => ({
        doodsonNumbers: column.doodsonNumbers,
        node: line.node,
        ratio: re,
        quadrature: im,
        ratioSigma,
        ratioTheory: line.ratio,
        turn: radiansToDegrees(atan2(im * Math.sign(line.ratio), re * Math.sign(line.ratio))),
      })),
    };
  });
}

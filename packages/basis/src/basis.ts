/**
 * A basis: the time functions z_j(t) = f_j·e^{i(V_j + u_j)} of a list of constituents, as plain data.
 *
 * Fitting and predicting use the same functions, so a fit that is predicted again cannot disagree with itself.
 * @module
 */
import { lunisolarLongitudesInto } from '@staithe/arguments';
import { type Constituent, type ConstituentName, constituent } from '@staithe/constituents';
import {
  type ArgumentModel,
  type Degrees,
  degreesToRadians,
  describe,
  HOUR,
  InputError,
  type Instant,
  type NodalHold,
  type NodalModel,
  readSampling,
  refuse,
  type Sampling,
  toInstant,
} from '@staithe/core';
import { sin } from '@staithe/core/trig';
import { type NodalPlan, nodalPhasorsInto, nodalPlan } from '@staithe/nodal';

/** What a basis is made of. @public */
export interface BasisOptions {
  readonly constituents: readonly (Constituent | ConstituentName)[];
  /** Default iers2010. */
  readonly argumentModel?: ArgumentModel | undefined;
  /** Default potential. */
  readonly nodalModel?: NodalModel | undefined;
  /** Default continuous. */
  readonly nodalHold?: NodalHold | undefined;
  /** Degrees north: lines of degree 3 enter. */
  readonly nodalLatitude?: Degrees | undefined;
  /** Values are means: the functions are weakened accordingly. */
  readonly sampling?: Sampling | undefined;
}

/** Plain data; survives `structuredClone`. Columns: the mean level, then cosine and sine of each constituent. @public */
export interface Basis {
  readonly names: readonly string[];
  /** Radians per millisecond, length K. */
  readonly speeds: Float64Array;
  /** Doodson numbers, six a constituent. */
  readonly multipliers: Int16Array;
  /** Degrees that V carries beyond the multipliers, length K. */
  readonly turns: Float64Array;
  /** What is left of each amplitude in the mean over a sample, length K. */
  readonly response: Float64Array;
  /** Milliseconds from the stamp of a sample to its middle. */
  readonly delay: number;
  readonly argumentModel: ArgumentModel;
  readonly hold: 'continuous' | 'calendar-year' | 'held';
  readonly nodal: NodalPlan;
  /** f·cos u, f·sin u held from the stated instant; 2K numbers, empty unless `hold` is held. */
  readonly held: Float64Array;
}

function readHold(hold: NodalHold): { hold: Basis['hold']; heldAt?: Instant } {
  if (hold === 'continuous' || hold === 'calendar-year') return { hold };
  const heldAt = (hold as { heldAt?: string } | null)?.heldAt;
  if (heldAt !== undefined) return { hold: 'held', heldAt: toInstant(heldAt, 'nodalHold.heldAt') };
  throw new InputError(
    'UNKNOWN_CHOICE',
    'nodalHold',
    `expected continuous, calendar-year or { heldAt }, got ${describe(hold)}`,
  );
}

/** sin(σW/2)/(σW/2): what the mean over W leaves of an oscillation. */
function meanResponse(speed: number, meanOver: number): number {
  const half = (speed * meanOver) / 2;
  return half === 0 ? 1 : sin(half) / half;
}

/**
 * Makes a basis.
 *
 * @param options - Constituents and models.
 * @returns Plain data.
 * @throws InputError of `constituent`, `nodalPlan` and `toInstant`; `DUPLICATE`, path `constituents[i]`;
 *   `UNKNOWN_CHOICE`, path `nodalHold`.
 * @example
 * makeBasis({ constituents: ['M2', 'S2'] }).names; // ['M2', 'S2']
 * @public
 */
export function makeBasis(options: BasisOptions): Basis {
  const { nodalLatitude, argumentModel = 'iers2010', nodalModel = 'potential' } = options;
  if (argumentModel !== 'iers2010' && argumentModel !== 'schureman1940') {
    refuse('UNKNOWN_CHOICE', 'argumentModel', 'iers2010 or schureman1940', argumentModel);
  }
  const { sampling } = readSampling(options.sampling);
  const list = options.constituents.map((c) => (typeof c === 'string' ? constituent(c) : c));
  const names = list.map(({ name }) => name);
  const seen = new Set<string>();
  names.forEach((name, i) => {
    if (seen.size < seen.add(name).size) return;
    throw new InputError(
      'DUPLICATE',
      `constituents[${i}]`,
      `expected each once, got ${name} again`,
    );
  });
  const speeds = Float64Array.from(list, ({ speed }) => degreesToRadians(speed) / HOUR);
  const nodal = nodalPlan(list, nodalModel, nodalLatitude);
  const { hold, heldAt } = readHold(options.nodalHold ?? 'continuous');
  const held = new Float64Array(heldAt === undefined ? 0 : 2 * list.length);
  if (heldAt !== undefined) {
    const six = new Float64Array(6);
    lunisolarLongitudesInto(heldAt, argumentModel, six);
    nodalPhasorsInto(nodal, six[3] as number, six[4] as number, held);
  }
  const meanOver = sampling?.meanOver ?? 0;
  const place = { start: 0.5, middle: 0, end: -0.5 }[sampling?.stamp ?? 'middle'];
  return {
    names,
    speeds,
    multipliers: Int16Array.from(list.flatMap(({ doodsonNumbers }) => [...doodsonNumbers])),
    turns: Float64Array.from(list, ({ quarterTurns }) => quarterTurns * 90),
    response: speeds.map((speed) => meanResponse(speed, meanOver)),
    delay: place * meanOver,
    argumentModel,
    hold,
    nodal,
    held,
  };
}

/**
 * Makes the vectors of longitudes, speeds, potential lines and node factors: node tools/vectors/astronomy.mjs FOLDER,
 * where FOLDER holds the tables named below. Run by hand when a table changes; what it writes is committed.
 */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readTable, sha256, writeVector } from './write.mjs';

const folder = process.argv[2];
if (!folder) throw new Error('expected the folder of the reference tables');
const at = (...parts) => join(folder, ...parts);
const json = (path) => JSON.parse(readFileSync(path, 'utf8'));

const IERS = 'G. Petit and B. Luzum (eds.), IERS Conventions (2010), IERS Technical Note 36';
const IERS_LICENCE =
  'Numbers of the IERS Conventions, used as data with citation; no software of the Conventions is copied';
const DOODSON_COLUMNS = ['tau', 's', 'h', 'p', 'Nprime', 'ps'];

const conventions = at('02_iers_tests', 'iers_routine_test_cases.json');
const quoted = json(conventions);

writeVector({
  id: 'iers2010-fundamental-arguments',
  title: 'IERS Conventions (2010), chapter 5.7: fundamental arguments of nutation, check case',
  source: `${IERS}, chapter 5, published check case of the luni-solar arguments; as quoted alike by several public test suites`,
  kind: 'published',
  unit: 'radians',
  licence: IERS_LICENCE,
  sourceSha256: sha256(conventions),
  tolerance: {
    abs: 1e-11,
    why: 'printed to 16 digits; the arguments run through a hundred turns, which costs three of them',
  },
  cases: [
    {
      centuriesTT: quoted.FUNDARG.t_julian_centuries_TT,
      l: Number(quoted.FUNDARG.expected_rad.l),
      lPrime: Number(quoted.FUNDARG.expected_rad.lprime),
      F: Number(quoted.FUNDARG.expected_rad.F),
      D: Number(quoted.FUNDARG.expected_rad.D),
      omega: Number(quoted.FUNDARG.expected_rad.Omega),
    },
  ],
});

writeVector({
  id: 'iers2010-doodson-phases',
  title: 'IERS Conventions (2010), chapter 7.1.2: phases and frequencies of tidal lines',
  source: `${IERS}, chapter 7 (ocean loading): M2 from its published check cases, the other rows computed with the same formulas by the test suite of an open-source space-dynamics library (Apache-2.0)`,
  kind: 'published',
  unit: 'degrees; frequency in cycles per day',
  licence: IERS_LICENCE,
  sourceSha256: sha256(conventions),
  tolerance: {
    abs: 5e-5,
    why: 'longitudes of slightly other series; the Conventions turn the Earth by the mean Sun here, tau = 15 UT + h - s (with true sidereal time M2 would differ by 0.014 degrees)',
  },
  notes: [
    'Phase: the sum of Doodson numbers times (tau, s, h, p, N prime, ps), without quarter turns, at the UTC named.',
  ],
  cases: quoted.TDFRPH.cases.map((row) => ({
    utc: `${row.utc}Z`,
    name: row.tide,
    doodsonNumbers: row.doodson,
    frequency: Number(row.freq),
    phase: Number(row.phase),
    origin: row.tide === 'M2' ? 'Conventions' : 'computed with the formulas of the Conventions',
  })),
});

const speeds = at('02_iers_tests', 'doodson_delaunay_speeds.csv');
writeVector({
  id: 'iers2010-table-6.5',
  title:
    'IERS Conventions (2010), Tables 6.5a, 6.5b and 6.5c: speeds and Doodson numbers of 71 lines',
  source: `${IERS}, Tables 6.5a-c; through the plain-text extract of an open-source space-dynamics library (Apache-2.0)`,
  kind: 'published',
  unit: 'degrees per mean solar hour',
  licence: IERS_LICENCE,
  sourceSha256: sha256(speeds),
  tolerance: {
    abs: 1.2e-5,
    why: 'printed to five decimals, of which the last is off by up to one unit in a sixth of the rows',
  },
  notes: [
    'The speed of 185.355 is printed as 16.12989; its Doodson numbers give 16.12982, so the print is off by 7 units of the last digit: listed in departures.',
  ],
  departures: ['185.355'],
  cases: readTable(speeds).map((row) => ({
    table: row.table,
    name: row.name,
    doodson: row.doodson,
    doodsonNumbers: DOODSON_COLUMNS.map((column) => Number(row[column])),
    speed: Number(row.speed_deg_per_hour),
  })),
});

const heights = at('02_iers_tests', 'table6_7_Hf.csv');
writeVector({
  id: 'iers2010-table-6.7',
  title: 'IERS Conventions (2010), Table 6.7: astronomical amplitudes Hf of 81 waves',
  source: `${IERS}, section 6.3.2, Table 6.7; through a transcription kept by an open-source space-dynamics library (Apache-2.0)`,
  kind: 'published',
  unit: 'm',
  licence: IERS_LICENCE,
  sourceSha256: sha256(heights),
  tolerance: {
    abs: 1.45e-5,
    rel: 6e-4,
    why: 'printed to 1e-5 m, and of a newer computation than the lines of Cartwright and Edden (1973): M2 0.63192 against 0.63221, 0.46 parts in a thousand; small lines differ by up to 1.4 printed units',
  },
  departures: {
    psi1: '166.554, an annual term: 0.00293 against 0.002885; Hartmann and Wenzel (1995) side with the newer value',
  },
  notes: [
    'Degree 2 but for 155.555, 245.555, 265.555 and their like, which are of degree 3. M4 has none and is left out; 137.445 is printed oddly there and kept.',
  ],
  cases: readTable(heights)
    .filter((row) => row.Hf_m !== '')
    .map((row) => ({
      name: row.name,
      doodsonNumbers: DOODSON_COLUMNS.map((column) => Number(row[column])),
      height: Number(row.Hf_m),
    })),
});

const erfa = at('03_erfa_args', 'fundamental_args_1850_2150.csv');
writeVector({
  id: 'erfa-fundamental-arguments',
  title:
    'Fundamental arguments of IERS Conventions (2003), chapter 5, and Greenwich mean sidereal time, 1850 to 2150',
  source:
    'Computed with ERFA 2.0.0 (Essential Routines for Fundamental Astronomy) from the expressions of Simon et al. (1994): s = F + Om, h = F + Om - D, p = F + Om - l, N = Om, ps = F + Om - D - lp',
  kind: 'reference-library',
  unit: 'degrees',
  licence: 'BSD-3-Clause (ERFA); the numbers were computed with it',
  sourceSha256: sha256(erfa),
  tolerance: {
    abs: 1e-8,
    why: 'the library itself rounds at 1e-12 degrees; the contract of the project asks 1e-8',
  },
  notes: [
    'One instant every 500 days. TDB is taken as TT. The sidereal times take the same number as UT1 and as TT: a check of the function, without Delta T.',
    'columns names the numbers of a case.',
  ],
  columns: ['julianDateTT', 's', 'h', 'p', 'N', 'ps', 'gmst1982', 'gmst2006'],
  cases: readTable(erfa).map((row) =>
    ['jd_tt', 's_deg', 'h_deg', 'p_deg', 'N_deg', 'ps_deg', 'gmst82_deg', 'gmst06_deg'].map((c) =>
      Number(row[c]),
    ),
  ),
});

const waves = (degree) => at('01_tgp_lines', `hw95_degree${degree}.csv`);
writeVector({
  id: 'hartmann-wenzel-1995',
  title:
    'Hartmann and Wenzel (1995), catalogue HW95: phases, frequencies and amplitudes of 650 waves of degrees 2 and 3',
  source:
    'T. Hartmann and H.-G. Wenzel (1995), The HW95 tidal potential catalogue, Geophys. Res. Lett. 22(24), 3553-3556; waves above 2e-4 m2/s2, through an extract by L. Petrov (NASA GSFC) in a public source tree for radio astronomy, amplitudes renormalised there',
  kind: 'published',
  unit: 'radians at J2000, radians per second, m2/s2',
  licence: 'Published numbers, used as data with citation',
  sourceSha256: { degree2: sha256(waves(2)), degree3: sha256(waves(3)) },
  tolerance: {
    rel: 0.002,
    why: 'amplitude against the heights of Cartwright and Tayler times 9.7982 m/s2, for heights above 0.005 m; both round, and the masses differ',
  },
  notes: [
    'All cosines, without the factor (-1)^m: the phase column holds the quarter turns of the diurnals, and 180 degrees for a negative amplitude. UT is taken equal to TT at J2000.',
    'merged lists the numbers of waves that the extract marks as merged with near-degenerate neighbours.',
    'columns names the numbers of a case; number is the one of the full catalogue.',
  ],
  columns: ['number', 'degree', 'order', 'phase', 'frequency', 'amplitude'],
  merged: [2, 3].flatMap((degree) =>
    readTable(waves(degree))
      .filter((row) => row.star === '*')
      .map((row) => Number(row.hw95_number)),
  ),
  cases: [2, 3].flatMap((degree) =>
    readTable(waves(degree)).map((row) => [
      Number(row.hw95_number),
      degree,
      Number(row.order_m),
      Number(row.phase_rad),
      Number(row.freq_rad_s),
      Number(row.amp_m2_s2),
    ]),
  ),
});

const seen = at('06_iho_list', 'noaa_speeds_seen.csv');
writeVector({
  id: 'speeds-noaa-21',
  title: 'Speeds of 21 constituents as printed in a published table of harmonic constants',
  source:
    'NOAA/NOS/CO-OPS, harmonic constituents of station 8727328, speeds as printed on its page (stored copy; the first 21 of 37 rows could be read)',
  kind: 'published',
  unit: 'degrees per mean solar hour',
  licence: 'Work of the US Government, public domain in the USA; cite NOAA/NOS/CO-OPS',
  sourceSha256: sha256(seen),
  tolerance: {
    abs: 1e-6,
    why: 'printed to six or seven decimals; O1, OO1 and MN4 are cut instead of rounded, LAM2 is off in the last digit',
  },
  notes: [
    'M4 and M6 have five decimals only: within half a unit (M4) and one unit (M6) of the last; MN4 is off by 1.7e-6 (cut). M1 is the line 155.655.',
  ],
  coarse: { M4: 5e-6, M6: 1e-5, MN4: 2e-6 },
  cases: readTable(seen).map((row) => ({ name: row.name, speed: Number(row.speed_deg_per_hour) })),
});

const SP98 =
  'P. Schureman, Manual of Harmonic Analysis and Prediction of Tides, C&GS Special Publication 98 (rev. 1940), formulas from memory';
const formulas = json(at('04_schureman_cem', 'schureman_formulas.json'));
const factors = at('04_schureman_cem', 'node_factors_derived_1960_2040.csv');
const byPrefix = (row, prefix) =>
  Object.fromEntries(
    Object.entries(row)
      .filter(([column]) => column.startsWith(prefix))
      .map(([column, text]) => [column.slice(prefix.length), Number(text)]),
  );
writeVector({
  id: 'schureman-derived-factors',
  title: 'Node factors f at mid-year and V0 + u after Schureman (SP 98), derived, 1960 to 2038',
  source: `${SP98}; derived with ERFA longitudes (UT taken as TT), and for f a second time by summing the nodal side-lines of the 342 lines of Cartwright and Tayler (1971) and Cartwright and Edden (1973). Not the printed Tables 14 and 15`,
  kind: 'from-memory',
  unit: '1 for f, degrees for V0 + u',
  licence: 'Formulas of a work of the US Government, public domain in the USA',
  sourceSha256: sha256(factors),
  tolerance: {
    abs: 2e-4,
    why: 'given to four decimals, longitudes of another theory; V0 + u: 0.1 degree, s of the two theories differs by up to 0.048',
  },
  notes: [
    'Every third year, so that leap years and common years both occur. f and u at 2 July 12h, V0 at 1 January 0h UT. side-lines: f from the potential alone. L2, M1 and M3 come from the formulas alone.',
    'bounds: the largest difference of f and u between the formulas and the side-lines of the potential over all N. longitudeBounds: the largest difference of the longitudes of SP 98 from those of ERFA, 1850 to 2150, degrees.',
  ],
  bounds: Object.fromEntries(
    Object.entries(formulas.max_abs_diff_vs_CTE_lines_over_all_N).map(([name, { f, u_deg }]) => [
      name,
      { f, u: u_deg },
    ]),
  ),
  longitudeBounds: { s: 0.048, h: 0.001, p: 0.007, N: 0.006, ps: 0.005 },
  cases: readTable(factors)
    .filter((row) => (Number(row.year) - 1960) % 3 === 0)
    .map((row) => ({
      year: Number(row.year),
      f: byPrefix(row, 'f_'),
      fSideLines: byPrefix(row, 'fcte_'),
      v0PlusU: byPrefix(row, 'V0u_'),
    })),
});

const sandyHook = at('04_schureman_cem', 'cem_table_II-5-6_sandy_hook.json');
const manual = json(sandyHook);
writeVector({
  id: 'sandy-hook-1984',
  title:
    'Coastal Engineering Manual, Table II-5-6: harmonic arguments for Sandy Hook, 1 January 1984',
  source:
    'U.S. Army Corps of Engineers, Coastal Engineering Manual, EM 1110-2-1100, Part II, chapter 5 (30 April 2002), Table II-5-6, pages II-5-26 and 27; read from a stored copy, column order recovered',
  kind: 'published',
  unit: 'degrees; f 1; H ft',
  licence: 'Work of the US Government, public domain in the USA',
  sourceSha256: sha256(sandyHook),
  tolerance: { abs: 0.15, why: 'V0 + u printed to 0.1 degree; f printed to 0.01, so within 0.005' },
  notes: [
    'The printed f are those of 1 January 1984, 0h; the printed V0 + u take u of the middle of 1984. Test the two apart.',
    'badCells: V0 + u of NU2 is printed as 148.0, the pL of its row repeated: unusable, null here.',
  ],
  factorTolerance: 0.005,
  badCells: [{ name: 'NU2', column: 'v0PlusU', printed: 148.0 }],
  place: {
    longitude: -manual.other.longitude_deg_W,
    timeMeridian: -manual.other.time_meridian_deg_W,
  },
  cases: Object.entries(manual.rows).map(
    ([printed, [v0PlusU, pL, aS15, kappa, f, heightFeet]]) => ({
      name: printed === 'nu2' ? 'NU2' : printed,
      v0PlusU,
      pL,
      aS15,
      kappa,
      f,
      heightFeet,
    }),
  ),
});
writeVector({
  id: 'sandy-hook-1984-derived',
  title: 'Node factors at 1 January 1984, derived beside Coastal Engineering Manual, Table II-5-6',
  source: `${SP98}; derived for 1984-01-01 0h with ERFA longitudes, to tell which date the two printed decimals of the Manual belong to`,
  kind: 'from-memory',
  unit: '1',
  licence: 'Formulas of a work of the US Government, public domain in the USA',
  sourceSha256: sha256(sandyHook),
  tolerance: { abs: 2e-4, why: 'given to four decimals, longitudes of another theory' },
  cases: manual.derived_f_at_1984_01_01,
});

const expansionsFile = at('07_nodal_and_levels', 'nodal_expansions_and_levels.json');
const levels = json(expansionsFile);
/** '1.0089 + 0.1871 cos N - 0.0147 cos 2N' as coefficients of cos 0, N, 2N …; sines the same, with 0 first. */
function coefficients(text) {
  const out = [0];
  for (const [, sign, number, multiple] of text.matchAll(
    /([+-]?)\s*([0-9.]+)(?:\s*(?:cos|sin)\s*([0-9]?)N)?/g,
  )) {
    const order = /(?:cos|sin)/.test(text) && multiple !== undefined ? Number(multiple || 1) : 0;
    out[order] = (sign === '-' ? -1 : 1) * Number(number);
  }
  return Array.from(out, (value) => value ?? 0);
}
const series = (table, bounds) =>
  Object.entries(table).flatMap(([names, { f, u }]) =>
    names.split(',').map((name) => ({
      name: { mu2: 'MU2', nu2: 'NU2' }[name] ?? name,
      f: coefficients(f),
      u: coefficients(u),
      ...(bounds[name] ? { bound: { f: bounds[name].f, u: bounds[name].u_deg } } : {}),
    })),
  );
writeVector({
  id: 'nodal-expansions',
  title:
    'Node factors as series in N: Pugh (1987), Table 4:3, and the three-term forms after Doodson (1928)',
  source:
    'D. T. Pugh (1987), Tides, Surges and Mean Sea-Level, Table 4:3; three-term forms after A. T. Doodson (1928); both from memory, checked numerically against the 342 lines of Cartwright and Tayler (1971) and Cartwright and Edden (1973)',
  kind: 'from-memory',
  unit: '1 for f, degrees for u',
  licence: 'Published numbers, used as data with citation',
  sourceSha256: sha256(expansionsFile),
  tolerance: {
    abs: 0.19,
    why: 'see bound of each case: its largest difference over all N from the potential lines that share the perigee of the main line',
  },
  notes: [
    'f is the sum of f[k] cos kN, u the sum of u[k] sin kN, N the longitude of the ascending node.',
    'The series hold the node alone. Where a case has no bound, none was measured.',
  ],
  cases: {
    twoTerm: series(levels.two_term, levels.max_abs_diff_vs_CTE_lines_two_term),
    threeTerm: series(levels.three_term, levels.max_abs_diff_vs_CTE_lines_three_term),
  },
});

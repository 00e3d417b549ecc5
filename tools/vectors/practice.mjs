/**
 * Makes the vectors of phase conversion and of the trade's facts: node tools/vectors/practice.mjs FOLDER, where FOLDER
 * holds the tables named below. Run by hand when a table changes; what it writes is committed.
 */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { sha256, writeVector } from './write.mjs';

const folder = process.argv[2];
if (!folder) throw new Error('expected the folder of the reference tables');
const json = (path) => JSON.parse(readFileSync(path, 'utf8'));

const datums = join(folder, '05_datums', 'datum_definitions.json');
writeVector({
  id: 'phase-conversion',
  title: 'Published harmonic constants of one station with Greenwich and local-time phases',
  source:
    'NOAA/NOS/CO-OPS, harmonic constituents of station 9414131, phases both for GMT and for local standard time (UTC-8), stored copy of the published table',
  kind: 'published',
  unit: 'degrees',
  licence: 'Work of the US Government, public domain in the USA; cite NOAA/NOS/CO-OPS',
  sourceSha256: sha256(datums),
  tolerance: { abs: 0.1, why: 'both phases printed to 0.1 degree; the rows agree within 0.07' },
  notes: ['The zone lies 8 hours west: zone phase = Greenwich phase - 8 * speed.'],
  zoneHours: -8,
  cases: json(datums).published_harmonic_constants_phase_check.rows.map((row) => ({
    name: row.c,
    amplitudeFeet: row.amp,
    greenwichPhaseLag: row.phase_GMT,
    zonePhaseLag: row.phase_local,
    speed: row.speed,
  })),
});

const checks = join(folder, '12_trade_checks', 'trade_checks.json');
const facts = json(checks);
writeVector({
  id: 'trade-checks',
  title:
    'Ages, equilibrium ratios, periods, separations, extended Doodson letters, Delta T and datum errors (Swanson 1974)',
  source:
    'Figures that the trade uses, from memory; datum errors after R. L. Swanson (1974), Variability of tidal datums, NOAA Technical Report NOS 64, from memory',
  kind: 'from-memory',
  unit: 'see the keys of cases',
  licence: 'Facts, used as data',
  sourceSha256: sha256(checks),
  tolerance: {
    abs: 0.01,
    why: 'see tolerances for each key of cases: half a unit of the last printed digit where the figure follows from the speeds; ratios of the equilibrium tide differ between books',
  },
  tolerances: {
    agesHoursPerDegree: 5e-4,
    equilibriumRatios: 0.005,
    periods: {
      M2Hours: 5e-5,
      springNeapDays: 5e-5,
      perigeeDays: 5e-5,
      tropicalMonthDays: 5e-5,
      declinationDays: 5e-5,
      nodeYears: 5e-3,
      perigeeYears: 5e-3,
    },
    separationDays: {
      'K2-S2': 0.05,
      'P1-K1': 0.05,
      'N2-M2': 5e-3,
      'S2-M2': 5e-3,
      'T2-S2': 5e-3,
      'NU2-N2': 0.05,
    },
    deltaTSeconds: 0.05,
  },
  cases: {
    agesHoursPerDegree: {
      phaseAge: facts.ages_hours_per_degree['phase age from S2 - M2'],
      parallaxAge: facts.ages_hours_per_degree['parallax age from M2 - N2'],
      diurnalAge: facts.ages_hours_per_degree['diurnal age from K1 - O1'],
    },
    equilibriumRatios: facts.equilibrium_ratios,
    periods: {
      M2Hours: facts.periods.M2_hours,
      springNeapDays: facts.periods.spring_neap_days,
      perigeeDays: facts.periods.perigee_days,
      tropicalMonthDays: facts.periods.tropical_month_days,
      declinationDays: facts.periods.declination_days,
      nodeYears: facts.periods.node_years,
      perigeeYears: facts.periods.perigee_years,
    },
    separationDays: facts.separation_days,
    extendedDoodsonLetters: facts.xdo,
    deltaTSeconds: facts.delta_t_seconds,
    datumErrorFeet: {
      coasts: facts.datum_error_ft_swanson_1974.columns,
      months: {
        1: facts.datum_error_ft_swanson_1974['1 month'],
        3: facts.datum_error_ft_swanson_1974['3 months'],
        6: facts.datum_error_ft_swanson_1974['6 months'],
        12: facts.datum_error_ft_swanson_1974['12 months'],
      },
    },
  },
});

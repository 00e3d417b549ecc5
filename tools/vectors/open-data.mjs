/**
 * Makes the vectors of open data: node tools/vectors/open-data.mjs FOLDER, where FOLDER holds the tables named below.
 * Run by hand when a table changes; what it writes is committed.
 */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { encodeInt16, readTable, scaled, sha256, writeVector } from './write.mjs';

const folder = process.argv[2];
if (!folder) throw new Error('expected the folder of the open data');

const MISSING = -32768;
const LICENCE =
  'Work of the US Government, public domain in the USA; cite NOAA/NOS/CO-OPS. Obtained through the public repository named, not from NOAA directly.';

/** The cells of a table with one line a UTC day and 24 columns, as [time text, cell text]. */
function dailyLayout(path) {
  return readFileSync(path, 'utf8')
    .trim()
    .split(/\r?\n/)
    .slice(1)
    .flatMap((line) => {
      const [date, ...cells] = line.split(',');
      return Array.from({ length: 24 }, (_, hour) => [
        `${date}T${String(hour).padStart(2, '0')}:00Z`,
        cells[hour] ?? '',
      ]);
    });
}

function hourlyVector({ cells, from, to, decimals, unit, file, ...rest }) {
  const kept = cells.filter(([time]) => time >= from && time < to);
  const hours = (Date.parse(to) - Date.parse(from)) / 3600000;
  if (kept.length !== hours || kept[0][0] !== from) {
    throw new Error(`${rest.id}: expected ${hours} hours from ${from}, got ${kept.length}`);
  }
  const values = kept.map(([, text]) => (text === '' ? MISSING : scaled(text, decimals)));
  const { id, title, source, ...more } = rest;
  writeVector({
    id,
    title,
    source,
    kind: 'open-data',
    unit,
    licence: LICENCE,
    ...more,
    sourceSha256: sha256(file),
    cases: {
      start: from,
      stepHours: 1,
      count: values.length,
      missing: values.filter((value) => value === MISSING).length,
      encoding: `integers of 16 bits, little-endian, base64; in units of ${10 ** -decimals} ${unit}; ${MISSING} is missing`,
      perUnit: 10 ** decimals,
      values: encodeInt16(values),
    },
  });
}

const laJolla = join(folder, 'noaa-9410230-la-jolla');
const laJollaFrom = (column) =>
  `NOAA/NOS/CO-OPS, station 9410230 La Jolla, ${column}; through the public repository kutaslab/fitgrid, fitgrid/data/CO-OPS_9410230`;
const LA_JOLLA_STATE = 'repository commit 86911b696fa4f9e1eebf195705a8a3b3fe9f8f31';

hourlyVector({
  id: 'la-jolla-predicted-2010-2020',
  title: 'La Jolla, official hourly predictions, August 2010 to July 2020',
  source: laJollaFrom('published hourly predictions above MSL (1983-2001), GMT'),
  retrieved: LA_JOLLA_STATE,
  tolerance: { abs: 0.0005, why: 'printed to 0.001 ft' },
  cells: dailyLayout(join(laJolla, 'predicted_hourly_ft_msl_gmt.csv')),
  file: join(laJolla, 'predicted_hourly_ft_msl_gmt.csv'),
  from: '2010-08-01T00:00Z',
  to: '2020-08-01T00:00Z',
  decimals: 3,
  unit: 'ft',
});
hourlyVector({
  id: 'la-jolla-observed',
  title: 'La Jolla, verified hourly heights, 2011 to 2019',
  source: laJollaFrom('verified hourly heights above MSL (1983-2001), GMT'),
  retrieved: LA_JOLLA_STATE,
  tolerance: { abs: 0.005, why: 'printed to 0.01 ft' },
  notes: [
    'Fit of 2012 with 32 constituents by an independent least-squares run (m, degrees): M2 0.502/142.2, S2 0.202/138.2, N2 0.120/120.8, K1 0.331/206.9, O1 0.213/191.8; residual standard deviation 0.043 m.',
  ],
  independentFit: {
    year: 2012,
    constituents: 32,
    residualDeviation: 0.043,
    rows: {
      M2: { amplitude: 0.502, phaseLag: 142.2 },
      S2: { amplitude: 0.202, phaseLag: 138.2 },
      N2: { amplitude: 0.12, phaseLag: 120.8 },
      K1: { amplitude: 0.331, phaseLag: 206.9 },
      O1: { amplitude: 0.213, phaseLag: 191.8 },
    },
  },
  cells: dailyLayout(join(laJolla, 'observed_hourly_ft_msl_gmt.csv')),
  file: join(laJolla, 'observed_hourly_ft_msl_gmt.csv'),
  from: '2011-01-01T00:00Z',
  to: '2020-01-01T00:00Z',
  decimals: 2,
  unit: 'ft',
});
hourlyVector({
  id: 'la-jolla-observed-2010',
  title: 'La Jolla, verified hourly heights, August to December 2010',
  source: laJollaFrom('verified hourly heights above MSL (1983-2001), GMT'),
  retrieved: LA_JOLLA_STATE,
  tolerance: { abs: 0.005, why: 'printed to 0.01 ft' },
  cells: dailyLayout(join(laJolla, 'observed_hourly_ft_msl_gmt.csv')),
  file: join(laJolla, 'observed_hourly_ft_msl_gmt.csv'),
  from: '2010-08-01T00:00Z',
  to: '2011-01-01T00:00Z',
  decimals: 2,
  unit: 'ft',
});

const eastport = join(folder, 'noaa-8410140-eastport', 'CO-OPS_8410140_2019_hourly.csv');
hourlyVector({
  id: 'eastport-observed-2019',
  title: 'Eastport, verified hourly heights, 2019',
  source:
    'NOAA/NOS/CO-OPS, station 8410140 Eastport, verified hourly heights, GMT; the datum is not stated (the mean says MLLW); through the public repository davicari/9504-2021-1C-TP1',
  retrieved: 'repository commit 470cac6e9265409b982ad3ed637c72f75b963bce',
  tolerance: { abs: 0.0005, why: 'printed to 0.001 m' },
  notes: [
    'The M2 amplitude of 2019 lies 1.7 % under the published one: the Gulf of Maine changes, and the year is one. Compare phases with the published constants, amplitudes with the independent fit.',
  ],
  independentFit: {
    year: 2019,
    constituents: 32,
    residualDeviation: 0.136,
    rows: {
      M2: { amplitude: 2.642, phaseLag: 98.5 },
      S2: { amplitude: 0.412, phaseLag: 139.1 },
      N2: { amplitude: 0.567, phaseLag: 67.1 },
      K1: { amplitude: 0.155, phaseLag: 194.0 },
      O1: { amplitude: 0.118, phaseLag: 175.6 },
    },
  },
  cells: readTable(eastport).map((row) => [
    `${row.Date.replaceAll('/', '-')}T${row['Time (GMT)']}Z`,
    row['Verified (m)'],
  ]),
  file: eastport,
  from: '2019-01-01T00:00Z',
  to: '2020-01-01T00:00Z',
  decimals: 3,
  unit: 'm',
});

const grandIsle = join(folder, 'noaa-8761724-grand-isle', 'observed_hourly_m_mhhw_gmt.csv');
const grandIsleCells = dailyLayout(grandIsle);
const GRAND_ISLE_FITS = {
  1990: {
    K1: { amplitude: 0.1128, phaseLag: 37.2 },
    O1: { amplitude: 0.1109, phaseLag: 31.6 },
    M2: { amplitude: 0.0137, phaseLag: 166.3 },
  },
  2001: { K1: { amplitude: 0.1098, phaseLag: 37.4 }, O1: { amplitude: 0.1094, phaseLag: 31.4 } },
  2010: { K1: { amplitude: 0.118, phaseLag: 35.3 }, O1: { amplitude: 0.1127, phaseLag: 28.4 } },
  2012: { K1: { amplitude: 0.1193, phaseLag: 36.2 }, O1: { amplitude: 0.1164, phaseLag: 29.7 } },
};
for (const [year, rows] of Object.entries(GRAND_ISLE_FITS)) {
  hourlyVector({
    id: `grand-isle-observed-${year}`,
    title: `Grand Isle, verified hourly heights, ${year}`,
    source:
      'NOAA/NOS/CO-OPS, station 8761724 Grand Isle, verified hourly heights about MHHW (as in force in January 2017), GMT; through the public repository scrim-network/BRICK, data/tideGauge_GrandIsle',
    retrieved: 'repository commit 72d519d8786a9588721f242f346a101a97ba0fac',
    tolerance: { abs: 0.0005, why: 'printed to 0.001 m' },
    independentFit: { year: Number(year), rows },
    cells: grandIsleCells,
    file: grandIsle,
    from: `${year}-01-01T00:00Z`,
    to: `${Number(year) + 1}-01-01T00:00Z`,
    decimals: 3,
    unit: 'm',
  });
}
hourlyVector({
  id: 'grand-isle-observed',
  title: 'Grand Isle, verified hourly heights, November 1980 to December 2016',
  source:
    'NOAA/NOS/CO-OPS, station 8761724 Grand Isle, verified hourly heights about MHHW (as in force in January 2017), GMT; through the public repository scrim-network/BRICK, data/tideGauge_GrandIsle',
  retrieved: 'repository commit 72d519d8786a9588721f242f346a101a97ba0fac',
  tolerance: { abs: 0.0005, why: 'printed to 0.001 m' },
  cells: grandIsleCells,
  file: grandIsle,
  from: '1980-11-12T00:00Z',
  to: '2017-01-01T00:00Z',
  decimals: 3,
  unit: 'm',
});

const sewells = join(folder, 'noaa-8638610-sewells-point-1928-1942', 'observed_hourly_m_gmt.csv');
const sewellsCells = dailyLayout(sewells);
const SEWELLS_FITS = {
  1929: { M2: { amplitude: 0.367, phaseLag: 50.1 } },
  1935: { M2: { amplitude: 0.365, phaseLag: 49.2 }, K1: { amplitude: 0.05, phaseLag: 200.1 } },
  1940: { M2: { amplitude: 0.36, phaseLag: 49.8 } },
};
for (const [year, rows] of Object.entries(SEWELLS_FITS)) {
  hourlyVector({
    id: `sewells-point-observed-${year}`,
    title: `Sewells Point, hourly heights, ${year}`,
    source:
      'NOAA/NOS/CO-OPS, station 8638610 Sewells Point, hourly heights above a fixed datum (probably MSL 1983-2001), GMT; through the public repository scrim-network/BRICK, data/tidegauge_SewellsPoint',
    retrieved: 'repository commit db612b6fb287fb48495574cc47f3f86a71fb615f',
    tolerance: { abs: 0.0005, why: 'printed to 0.001 m' },
    independentFit: { year: Number(year), rows },
    cells: sewellsCells,
    file: sewells,
    from: `${year}-01-01T00:00Z`,
    to: `${Number(year) + 1}-01-01T00:00Z`,
    decimals: 3,
    unit: 'm',
  });
}

const newLondon = join(
  folder,
  'noaa-8461490-new-london-hilo',
  'predicted_hilo_m_navd88_gmt_1939-2014.csv',
);
const turning = readTable(newLondon);
const minutes = turning.map((row) => Date.parse(`${row.time_gmt}Z`) / 60000);
writeVector({
  id: 'new-london-predicted-high-low',
  title: 'New London, official predicted high and low waters, 1939 to 2014',
  source:
    'NOAA/NOS/CO-OPS, station 8461490 New London, published predicted high and low waters above NAVD88, GMT; through the public repository tonyewong/Klufas_NewLondon, predicted_data',
  kind: 'open-data',
  unit: 'm',
  licence: LICENCE,
  retrieved: 'repository commit d6243fb607b1708d0be9e8cff13225c2b689555d',
  sourceSha256: sha256(newLondon),
  tolerance: { abs: 0.005, why: 'printed to 0.01 m; times to the minute, so within 0.5 min' },
  notes: [
    'Three turning points are missing, each where two of the yearly files were joined: the rows in sameKindAsBefore follow one of their own kind.',
    'The mean offset of NAVD88 from mean sea level is -0.092 m.',
  ],
  meanOffset: -0.092,
  cases: {
    first: `${turning[0].time_gmt}Z`,
    count: turning.length,
    encoding:
      'integers of 16 bits, little-endian, base64; minutesSinceBefore counts from the row before (first row: 0), heights are in 0.01 m; kinds alternate from firstKind but for the rows listed (counted from 0)',
    firstKind: turning[0].type === 'H' ? 'high' : 'low',
    sameKindAsBefore: turning.flatMap((row, i) =>
      i > 0 && row.type === turning[i - 1].type ? [i] : [],
    ),
    minutesSinceBefore: encodeInt16(minutes.map((m, i) => (i === 0 ? 0 : m - minutes[i - 1]))),
    heights: encodeInt16(turning.map((row) => scaled(row.height_m, 2))),
  },
});

const constants = join(folder, 'noaa-harmonic-constants');
const CONSTANTS_SOURCE =
  'through a public repository of NOAA/NCEP Central Operations, folder parm; rearranged';
const CONSTANTS_STATE =
  'repository commit 279e00fd93bc4860722ef20c73275696b506cb8d, values as of June 2022';
const CONSTANTS_TOLERANCE = {
  abs: 0.0005,
  why: 'amplitudes printed to 0.001 ft, phases to 0.1 degree',
};
const ROW =
  'name: [amplitude ft, Greenwich phase lag degrees, speed degrees per hour]; amplitude 0 means not resolved';

function constantsByStation(path) {
  const stations = {};
  for (const row of readTable(path)) {
    stations[row.station] ??= {};
    stations[row.station][row.constituent] = [
      Number(row.amplitude_ft),
      Number(row.phase_gmt_deg),
      Number(row.speed_deg_per_hour),
    ];
  }
  return stations;
}

const datumsFile = join(constants, 'station_datums_ft.csv');
const constantsFile = join(constants, 'constants_37.csv');
writeVector({
  id: 'noaa-constants-37',
  title: 'Published harmonic constants (37 each) and datums of 15 stations',
  source: `NOAA/NOS/CO-OPS, published harmonic constants and datums (epoch 1983-2001 or a modified 5-year epoch); ${CONSTANTS_SOURCE}`,
  kind: 'open-data',
  unit: 'ft, degrees, degrees per hour',
  licence: LICENCE,
  retrieved: CONSTANTS_STATE,
  sourceSha256: { constants: sha256(constantsFile), datums: sha256(datumsFile) },
  tolerance: CONSTANTS_TOLERANCE,
  notes: [
    'M1 is the line 155.655 (14.4966939 degrees per hour).',
    'Datums are feet above the zero of the station; some stations give them above another zero, so only differences are safe.',
  ],
  cases: {
    row: ROW,
    constants: constantsByStation(constantsFile),
    datums: Object.fromEntries(
      readTable(datumsFile).map((row) => [
        row.station,
        {
          name: row.name.replaceAll('-', ' '),
          latitude: Number(row.lat),
          longitude: Number(row.lon),
          HAT: Number(row.HAT_ft),
          MHHW: Number(row.MHHW_ft),
          MSL: Number(row.MSL_ft),
          MLLW: Number(row.MLLW_ft),
        },
      ]),
    ),
  },
});

const anchorageFile = join(constants, 'constants_9455920_anchorage_extended.csv');
writeVector({
  id: 'noaa-constants-anchorage',
  title: 'Published harmonic constants of Anchorage with its shallow-water terms (124 names)',
  source: `NOAA/NOS/CO-OPS, station 9455920 Anchorage, published harmonic constants; ${CONSTANTS_SOURCE}`,
  kind: 'open-data',
  unit: 'ft, degrees, degrees per hour',
  licence: LICENCE,
  retrieved: CONSTANTS_STATE,
  sourceSha256: sha256(anchorageFile),
  tolerance: CONSTANTS_TOLERANCE,
  notes: [
    'A name is settled by its speed here: TK1 = pi1, RP1 = psi1, KP1 = phi1; OO2 (27.3416965) is O1 + Q1; N4 (56.8794590) is 2N2 in the quarter-diurnal band, N2 + N2.',
  ],
  cases: { row: ROW, constants: constantsByStation(anchorageFile) },
});

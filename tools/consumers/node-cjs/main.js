const { fitHarmonics, tideCurve, uniformSeries } = require('staithe');
const { lunisolarLongitudes } = require('staithe/arguments');
const { constants, record, constituents, instants } = require('./harbour.json');

if (typeof lunisolarLongitudes !== 'function') throw new Error('staithe/arguments: no function');
const { values } = tideCurve(constants).heights(record);
const series = uniformSeries({ start: record.start, step: record.step, values });
const curve = tideCurve(fitHarmonics(series, { constituents }).constants);
console.log(JSON.stringify(instants.map((instant) => curve.height(instant))));

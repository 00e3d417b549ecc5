import { lunisolarLongitudes } from 'staithe/arguments';
import { job } from './job.js';

if (typeof lunisolarLongitudes !== 'function') throw new Error('staithe/arguments: no function');
console.log(JSON.stringify(job()));

/**
 * Proof of bounded memory: ten million lines of a one-minute record stream through the reader. Prints the time and the
 * largest resident memory of this process; exits 1 above 300 MB. BENCH_SMALL=1 takes 200 000 lines. A number as argument asks for fewer lines; `uneven`
 * as second argument makes every step different.
 *
 * Run: node --import tsx packages/gauge/bench/ten-million-lines.ts
 */
import { readGaugeCsv } from '../src/index.js';

const LIMIT = 300; // MB
const lines = Number(process.argv[2] ?? (process.env['BENCH_SMALL'] ? 200_000 : 10_000_000));
const uneven = process.argv[3] === 'uneven';

async function* file(): AsyncGenerator<Uint8Array> {
  const encoder = new TextEncoder();
  let text = 'time_utc,height_m\n';
  let time = Date.UTC(2010, 0, 1);
  for (let i = 0; i < lines; i++) {
    const height = Math.sin(i / 118.6) * 1.5 + ((i * 7919) % 13) / 1000;
    text += `${new Date(time).toISOString().slice(0, 19)}Z,${height.toFixed(3)}\n`;
    time += uneven ? 59000 + ((i * 7919) % 3) * 1000 : 60000;
    if (text.length > 60000) {
      yield encoder.encode(text);
      text = '';
    }
  }
  yield encoder.encode(text);
}

const began = Date.now();
const before = process.memoryUsage().rss;
const record = await readGaugeCsv(file());
const megabytes = (process.resourceUsage().maxRSS * 1024) / 1e6;
console.log(
  JSON.stringify({
    lines,
    samples: record.series.values.length,
    uniform: record.series.step !== undefined,
    seconds: (Date.now() - began) / 1000,
    megabytesBefore: Math.round(before / 1e6),
    megabytesAtMost: Math.round(megabytes),
  }),
);
if (record.series.values.length !== lines || megabytes > LIMIT) process.exitCode = 1;

/**
 * Serves the built page, opens it in headless Chromium (its path in CHROMIUM) and prints what the page worked out.
 */
import { execFile } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { extname, join, normalize } from 'node:path';
import { promisify } from 'node:util';

const kinds = { '.html': 'text/html', '.js': 'text/javascript' };
const server = createServer((request, response) => {
  const path = request.url === '/' ? 'index.html' : normalize(request.url).slice(1);
  try {
    const body = readFileSync(join('dist', path));
    response.writeHead(200, { 'content-type': kinds[extname(path)] ?? 'application/octet-stream' });
    response.end(body);
  } catch {
    response.writeHead(404).end();
  }
});
await new Promise((resolve) => server.listen(0, '127.0.0.1', resolve));
const profile = mkdtempSync(join(tmpdir(), 'staithe-chromium-'));
try {
  const { stdout } = await promisify(execFile)(
    process.env.CHROMIUM ?? 'chromium',
    [
      '--headless',
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      `--user-data-dir=${profile}`,
      '--timeout=60000',
      '--dump-dom',
      `http://127.0.0.1:${server.address().port}/`,
    ],
    { maxBuffer: 1 << 24, timeout: 120_000 },
  );
  const shown = /<output id="heights">([^<]*)<\/output>/.exec(stdout)?.[1];
  if (!shown?.startsWith('[')) throw new Error(`the page shows ${shown ?? stdout}`);
  console.log(shown);
} finally {
  server.close();
  rmSync(profile, { recursive: true, force: true });
}

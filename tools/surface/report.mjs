/**
 * The public surface of every package, kept beside it under review: etc/NAME.api.md holds the types of each entry, as API
 * Extractor reads them from the built declarations; etc/NAME.exports.txt the names importable at run time, the same for
 * ESM and CommonJS. Without arguments, compares; with --update, writes.
 */
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join, relative } from 'node:path';
import { pathToFileURL } from 'node:url';
import { Extractor, ExtractorConfig, ExtractorLogLevel } from '@microsoft/api-extractor';
import { conclude, packages, root } from '../gate/packages.mjs';

const update = process.argv.includes('--update');
const findings = [];
const scratch = mkdtempSync(join(tmpdir(), 'staithe-surface-'));
process.on('exit', () => rmSync(scratch, { recursive: true, force: true }));

/** The name of an entry's report: 'core', 'arguments-sky'. */
function reportName(folder, subpath) {
  return subpath === '.' ? folder : `${folder}-${subpath.slice(2).replaceAll('/', '-')}`;
}

/** The API report of one entry as text; its complaints go to the findings. */
function typesOf({ directory, folder }, { subpath, types }) {
  const name = reportName(folder, subpath);
  const made = join(scratch, folder);
  mkdirSync(made, { recursive: true });
  const quiet = { logLevel: ExtractorLogLevel.None };
  const config = ExtractorConfig.prepare({
    configObject: {
      projectFolder: directory,
      mainEntryPointFilePath: join(directory, types),
      newlineKind: 'lf',
      apiReport: {
        enabled: true,
        reportFileName: `${name}.api.md`,
        reportFolder: made,
        reportTempFolder: join(made, 'temp'),
      },
      docModel: { enabled: false },
      dtsRollup: { enabled: false },
      tsdocMetadata: { enabled: false },
      compiler: {
        overrideTsconfig: {
          compilerOptions: {
            target: 'ES2022',
            lib: ['ES2022'],
            module: 'NodeNext',
            moduleResolution: 'NodeNext',
            strict: true,
            skipLibCheck: true,
            types: [],
          },
          files: [join(directory, types)],
        },
      },
      messages: {
        compilerMessageReporting: { default: { logLevel: ExtractorLogLevel.Error } },
        extractorMessageReporting: {
          default: { logLevel: ExtractorLogLevel.Error },
          // Doc comments are TypeDoc's business, and a package of many names documents itself in its README.
          'ae-undocumented': quiet,
          'ae-unresolved-link': quiet,
        },
        tsdocMessageReporting: { default: quiet },
      },
    },
    packageJsonFullPath: join(directory, 'package.json'),
    configObjectFullPath: undefined,
  });
  Extractor.invoke(config, {
    localBuild: true,
    messageCallback(message) {
      const serious = message.logLevel === 'error' || message.logLevel === 'warning';
      if (serious && !message.messageId.startsWith('console-')) {
        findings.push(`packages/${folder} ${subpath}: ${message.messageId} ${message.text}`);
      }
      message.handled = true;
    },
  });
  const path = join(made, `${name}.api.md`);
  return existsSync(path) ? readFileSync(path, 'utf8') : '';
}

/** The names importable at run time, an entry a paragraph. */
async function namesOf({ directory, folder, entries }) {
  const require = createRequire(join(directory, 'package.json'));
  const paragraphs = [];
  for (const { subpath, module, common } of entries) {
    const names = Object.keys(await import(pathToFileURL(join(directory, module)).href)).sort();
    const inCommon = Object.keys(require(join(directory, common))).sort();
    if (names.join() !== inCommon.join()) {
      findings.push(`packages/${folder} ${subpath}: ESM exports ${names}, CommonJS ${inCommon}`);
    }
    paragraphs.push([subpath, ...names.map((name) => `  ${name}`)].join('\n'));
  }
  return `${paragraphs.join('\n')}\n`;
}

/** Compares one kept file with what is there now, or writes it. */
function keep(path, text) {
  if (update) {
    mkdirSync(join(path, '..'), { recursive: true });
    writeFileSync(path, text);
    return;
  }
  const kept = existsSync(path) ? readFileSync(path, 'utf8').replaceAll('\r\n', '\n') : undefined;
  if (kept === text) return;
  const lines = new Set(kept?.split('\n'));
  const now = new Set(text.split('\n'));
  const shown = [
    ...[...lines].filter((line) => !now.has(line)).map((line) => `  - ${line}`),
    ...[...now].filter((line) => !lines.has(line)).map((line) => `  + ${line}`),
  ].slice(0, 20);
  findings.push(
    `${relative(root, path)}: ${kept === undefined ? 'is not kept yet' : 'the surface changed'}; ` +
      `look at it, then run: npm run surface -- --update\n${kept === undefined ? '' : shown.join('\n')}`,
  );
}

let count = 0;
for (const entry of packages().filter(({ entries }) => entries.length > 0)) {
  const etc = join(entry.directory, 'etc');
  const wanted = new Set([`${entry.folder}.exports.txt`]);
  for (const { subpath, types } of entry.entries) {
    const file = `${reportName(entry.folder, subpath)}.api.md`;
    wanted.add(file);
    keep(join(etc, file), typesOf(entry, { subpath, types }));
    count += 1;
  }
  keep(join(etc, `${entry.folder}.exports.txt`), await namesOf(entry));
  for (const file of existsSync(etc) ? readdirSync(etc) : []) {
    if (wanted.has(file)) continue;
    if (update) rmSync(join(etc, file));
    else findings.push(`packages/${entry.folder}/etc/${file}: no entry has this name any more`);
  }
}
conclude(findings, `${count} entries: the surface is the reviewed one`);

// Makes a fresh machine ready, with nothing but Node: packages, the build (--built), a Chromium for the page tests (--tests).
import { execSync } from 'node:child_process';
import { existsSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';

const root = new URL('..', import.meta.url).pathname;
process.chdir(root);
const wants = (flag) => process.argv.includes(flag);
// Everything goes to standard error, so that `armload … --json` keeps standard output to itself.
const run = (command) => execSync(command, { stdio: ['ignore', 2, 2] });
const timeOf = (path) => (existsSync(path) ? statSync(path).mtimeMs : 0);

/** Latest change (ms) in a tree of source files. */
function newest(path) {
  const stat = statSync(path);
  if (!stat.isDirectory()) return stat.mtimeMs;
  return Math.max(stat.mtimeMs, ...readdirSync(path).map((name) => newest(join(path, name))));
}

if (timeOf('node_modules/.package-lock.json') < timeOf('package-lock.json')) run('npm ci --no-audit --no-fund');

if (wants('--built')) {
  const sources = ['src', 'index.html', 'models', 'package-lock.json', 'vite.config.ts'];
  if (timeOf('dist/node/cli.js') < Math.max(...sources.map(newest))) run('npx vite build --app --logLevel warn');
}

if (wants('--tests')) {
  const known = [process.env.CHROME_PATH, '/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];
  if (!known.some((path) => path && existsSync(path))) {
    const isRoot = process.getuid?.() === 0;
    if (!isRoot || !existsSync('/usr/bin/apt-get')) {
      console.error('The page tests need Chromium. Install it, or name one in CHROME_PATH, then run `npm test` again.');
      process.exit(1);
    }
    run('apt-get -o DPkg::Lock::Timeout=300 update -q');
    run('apt-get -o DPkg::Lock::Timeout=300 install -y -q --no-install-recommends chromium');
  }
}

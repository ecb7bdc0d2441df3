// Runs before anything is installed, so it may use nothing but Node itself.
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const checkout = join(dirname(fileURLToPath(import.meta.url)), '..', '..');

const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  stop(`Quartzhold needs Node.js 20.19 or newer; this is ${process.versions.node}.`);
}

if (!installedAsLocked()) {
  console.log('Installing the packages named in package-lock.json ...');
  const install = () =>
    spawnSync('npm', ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'], {
      cwd: checkout,
      stdio: ['ignore', 'inherit', 'inherit'],
      timeout: 15 * 60_000,
    });
  // The registry is the one thing here that can fail by bad luck: one second try.
  if (install().status !== 0 && install().status !== 0) {
    stop('npm ci failed twice; see its message above. Is the npm registry within reach?');
  }
}

/**
 * npm leaves a copy of the lock it installed in node_modules; it is written last, so an
 * interrupted install has none. Packages for other platforms are optional and may be absent.
 */
function installedAsLocked() {
  const installedLock = join(checkout, 'node_modules', '.package-lock.json');
  if (!existsSync(installedLock)) return false;
  const wanted = JSON.parse(readFileSync(join(checkout, 'package-lock.json'), 'utf8')).packages;
  const installed = JSON.parse(readFileSync(installedLock, 'utf8')).packages;
  return Object.entries(wanted).every(([place, entry]) => {
    if (place === '') return true;
    const there = installed[place];
    if (!there) return Boolean(entry.optional);
    return there.version === entry.version && existsSync(join(checkout, place));
  });
}

function stop(sentence) {
  console.error(sentence);
  process.exit(1);
}

import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { checkoutFolder } from '../server/launch/checkout';
import { LaunchError } from '../server/launch/command';
import { publishCluster } from './support/cluster';
import {
  startThrowAwayCluster,
  throwAwayPrefix,
  type ThrowAwayCluster,
} from './support/throw-away-cluster';
import type { Tally } from './support/tally-reporter';

/*
 * npm test                              every suite
 * npm test -- api                       one suite: reference, unit, api or browser
 * npm test -- tests/api/lots.test.ts    one file; further options go to Vitest as they are
 *
 * The last line is "N passed, N failed". What fails outside a test (a file that does not load, an
 * error nobody caught, a skipped test in a run of everything) counts as a failure too.
 */
const suites = ['reference', 'unit', 'api', 'browser'];
const usesDatabase = new Set(['api', 'browser']);
const wishes = process.argv.slice(2);
const projects = wishes.filter((wish) => suites.includes(wish));
const rest = wishes.filter((wish) => !suites.includes(wish));
const everything = rest.length === 0;

let cluster: ThrowAwayCluster | undefined;
let vitest: ChildProcess | undefined;
let interrupted = false;
const folder = mkdtempSync(join(tmpdir(), `${throwAwayPrefix}${process.pid}-run-`));

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) {
  process.on(signal, () => {
    // While the cluster is being made there is nothing to end yet: it is made, then removed.
    interrupted = true;
    vitest?.kill('SIGTERM');
  });
}

try {
  if (projects.length === 0 || projects.some((project) => usesDatabase.has(project))) {
    cluster = await startThrowAwayCluster();
    publishCluster(cluster);
  }
  if (interrupted) await finish(130);
  const { code, tally } = await runVitest();
  if (interrupted) await finish(130);
  for (const trouble of tally.troubles) console.log(`FAILED outside a test: ${trouble}`);
  let failed = tally.failed + tally.troubles.length;
  if (everything && tally.skipped > 0) {
    console.log(`FAILED: ${tally.skipped} skipped tests; a test runs or goes`);
    failed += tally.skipped;
  }
  if (failed === 0 && code !== 0) {
    console.log(`FAILED: Vitest ended with code ${code}`);
    failed = 1;
  }
  if (tally.passed + failed === 0) console.log('No test ran.');
  await finish(
    failed > 0 || tally.passed === 0 ? 1 : 0,
    `${tally.passed} passed, ${failed} failed`,
  );
} catch (error) {
  console.error(error instanceof LaunchError ? error.message : error);
  await finish(1, '0 passed, 1 failed');
}

function runVitest(): Promise<{ code: number; tally: Tally }> {
  const tallyFile = join(folder, 'tally.json');
  const child = spawn(
    process.execPath,
    [
      join(checkoutFolder, 'node_modules/vitest/vitest.mjs'),
      'run',
      '--reporter=default',
      `--reporter=${join(checkoutFolder, 'tests/support/tally-reporter.ts')}`,
      ...projects.flatMap((project) => ['--project', project]),
      ...rest,
    ],
    {
      cwd: checkoutFolder,
      stdio: ['ignore', 'inherit', 'inherit'],
      env: { ...process.env, QUARTZHOLD_TALLY: tallyFile },
    },
  );
  vitest = child;
  return new Promise((resolve) => {
    child.on('exit', (code) => {
      vitest = undefined;
      const tally: Tally = existsSync(tallyFile)
        ? (JSON.parse(readFileSync(tallyFile, 'utf8')) as Tally)
        : { passed: 0, failed: 0, skipped: 0, troubles: ['Vitest did not finish'] };
      resolve({ code: code ?? 1, tally });
    });
  });
}

async function finish(code: number, closingLine?: string): Promise<never> {
  await cluster?.remove();
  rmSync(folder, { recursive: true, force: true });
  if (closingLine) process.stdout.write(`${closingLine}\n`);
  process.exit(code);
}

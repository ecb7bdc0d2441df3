import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { checkoutFolder } from './checkout';
import { runOrStop } from './command';
import { readIfThere, withLock } from './lock';
import { say } from './say';

interface Side {
  title: string;
  sources: readonly string[];
  arguments: readonly string[];
  result: string;
}

const common = ['shared', 'vite.config.ts', 'package-lock.json'];

const sides: Record<'client' | 'server', Side> = {
  client: {
    title: 'pages',
    sources: ['index.html', 'public', 'src', ...common],
    arguments: ['build'],
    result: 'dist/client/index.html',
  },
  server: {
    title: 'server',
    sources: ['server', ...common],
    arguments: ['build', '--ssr', 'server/index.ts', '--outDir', 'dist/server'],
    result: 'dist/server/index.js',
  },
};

/** Builds what has changed since its last build; quick when nothing has. */
export async function ensureBuilt(...wanted: (keyof typeof sides)[]): Promise<void> {
  const folder = join(checkoutFolder, 'dist');
  mkdirSync(folder, { recursive: true });
  await withLock(join(folder, '.lock'), async () => {
    for (const name of wanted) {
      const side = sides[name];
      const stamp = join(folder, `.${name}-sources`);
      const mark = markOf(side.sources);
      if (readIfThere(stamp) === mark && existsSync(join(checkoutFolder, side.result))) continue;
      say(`Building the ${side.title} ...`);
      await runOrStop(
        'build_failed',
        `The ${side.title} could not be built.`,
        process.execPath,
        ['node_modules/vite/bin/vite.js', ...side.arguments, '--logLevel', 'warn'],
        { cwd: checkoutFolder, env: buildEnvironment(), timeoutMs: 10 * 60_000 },
      );
      writeFileSync(stamp, mark);
    }
  });
}

/** A build asked for by a test run is the same build. */
function buildEnvironment(): NodeJS.ProcessEnv {
  const env: NodeJS.ProcessEnv = { ...process.env, NODE_ENV: 'production' };
  for (const name of Object.keys(env)) if (name.startsWith('VITEST')) delete env[name];
  return env;
}

function markOf(sources: readonly string[]): string {
  const hash = createHash('sha256');
  for (const file of sources.flatMap(filesUnder).sort()) {
    hash
      .update(file)
      .update('\0')
      .update(readFileSync(join(checkoutFolder, file)))
      .update('\0');
  }
  return hash.digest('hex');
}

function filesUnder(place: string): string[] {
  const path = join(checkoutFolder, place);
  if (!existsSync(path)) return [];
  if (statSync(path).isFile()) return [place];
  return readdirSync(path).flatMap((name) => filesUnder(join(place, name)));
}

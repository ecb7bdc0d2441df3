import { existsSync, mkdirSync, readdirSync, renameSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { checkoutFolder, localFolder, makeLocalFolder } from './checkout';
import { run, type CommandResult } from './command';

const unpackFolder = join(localFolder, 'debian');

export interface UnpackedRoot {
  folder: string;
  env: NodeJS.ProcessEnv;
}

/** The folder a package was unpacked into by an ordinary user, and the environment its programs need. */
export function unpackedRoot(packageName: string): UnpackedRoot | undefined {
  const root = join(unpackFolder, packageName);
  if (!existsSync(root)) return undefined;
  const libraries = libraryFolders(root);
  const inherited = process.env.LD_LIBRARY_PATH;
  return {
    folder: root,
    env: {
      LD_LIBRARY_PATH: [...libraries, ...(inherited ? [inherited] : [])].join(':'),
      FONTCONFIG_PATH: existsSync('/etc/fonts') ? '/etc/fonts' : join(root, 'etc/fonts'),
    },
  };
}

/** Fetches a package with those of its dependencies the machine lacks, and unpacks them; needs no rights. */
export async function unpackDebianPackage(packageName: string): Promise<CommandResult> {
  makeLocalFolder();
  const state = join(localFolder, 'apt');
  const archives = join(state, 'cache', 'archives');
  mkdirSync(join(state, 'state', 'lists', 'partial'), { recursive: true });
  mkdirSync(join(archives, 'partial'), { recursive: true });
  const own = [
    ...option('Dir::State', join(state, 'state')),
    ...option('Dir::State::status', '/var/lib/dpkg/status'),
    ...option('Dir::Cache', join(state, 'cache')),
    ...option('Dir::Cache::archives', archives),
    ...option('Debug::NoLocking', '1'),
    ...option('APT::Sandbox::User', ''),
    ...option('Acquire::Retries', '2'),
    // Hooks in apt.conf.d are written for root.
    ...option('APT::Update::Post-Invoke', ''),
    ...option('APT::Update::Post-Invoke-Success', ''),
  ];
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const refreshed = await run('apt-get', [...own, '-q', 'update'], { env, timeoutMs: 5 * 60_000 });
  const fetched = await run(
    'apt-get',
    [...own, '-q', '-y', '--no-install-recommends', '--download-only', 'install', packageName],
    { env, timeoutMs: 15 * 60_000 },
  );
  if (fetched.code !== 0) {
    return { ...fetched, stderr: `${refreshed.stderr}\n${fetched.stderr}` };
  }
  // Beside and renamed when whole, so that an interruption leaves nothing half unpacked.
  const root = join(unpackFolder, packageName);
  const partial = `${root}.partial`;
  rmSync(partial, { recursive: true, force: true });
  mkdirSync(partial, { recursive: true });
  for (const archive of readdirSync(archives).filter((name) => name.endsWith('.deb'))) {
    const unpacked = await run('dpkg', ['-x', join(archives, archive), partial], {
      cwd: checkoutFolder,
    });
    if (unpacked.code !== 0) return unpacked;
    rmSync(join(archives, archive));
  }
  rmSync(root, { recursive: true, force: true });
  renameSync(partial, root);
  return fetched;
}

function option(name: string, value: string): string[] {
  return ['-o', `${name}=${value}`];
}

/** Debian keeps libraries in usr/lib, lib, their folders named for the architecture, and one below. */
function libraryFolders(root: string): string[] {
  return ['usr/lib', 'lib'].flatMap((place) => {
    const folder = join(root, place);
    const ofArchitecture = foldersIn(folder).filter((path) => path.includes('-linux-'));
    const below = ofArchitecture.flatMap(foldersIn).filter(holdsLibraries);
    return [folder, ...ofArchitecture, ...below].filter((path) => existsSync(path));
  });
}

function foldersIn(folder: string): string[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => join(folder, entry.name));
}

function holdsLibraries(folder: string): boolean {
  return readdirSync(folder).some((name) => /^lib.*\.so/.test(name));
}

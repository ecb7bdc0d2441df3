import { existsSync } from 'node:fs';
import { LaunchError, lastWords, run, type CommandOptions, type CommandResult } from './command';
import { unpackDebianPackage, unpackedRoot } from './debian-unpack';
import { say } from './say';

export interface DebianProgram {
  path: string;
  /** What to add to the environment of the program; empty when Debian installed it. */
  env: NodeJS.ProcessEnv;
}

export interface DebianWish {
  /** Name of the Debian package that brings the program. */
  packageName: string;
  /** What people call it, for messages. */
  title: string;
  /** Given a file system root ('' or the folder of unpacked packages): the program's path, if there. */
  find: (root: string) => string | undefined;
}

/**
 * "This Debian program must be here": found, or installed as root, or through sudo where it asks
 * nothing, or else fetched and unpacked into .local/debian for this checkout alone.
 */
export async function ensureDebianProgram(wish: DebianWish): Promise<DebianProgram> {
  const present = await findDebianProgram(wish);
  if (present) return present;

  if (!existsSync('/usr/bin/apt-get')) {
    throw new LaunchError(
      'no_apt',
      `${wish.title} is not on this machine and there is no apt-get to bring it: install ${wish.packageName} by hand.`,
    );
  }
  const prefix = await administratorPrefix();
  if (prefix) {
    say(`Installing ${wish.title} (Debian package ${wish.packageName}) ...`);
    await twice(`install ${wish.packageName}`, () => installAsRoot(prefix, wish.packageName));
  } else {
    say(
      `Fetching ${wish.title} (Debian package ${wish.packageName}) into .local/debian; no administrator rights are needed ...`,
    );
    await twice(`fetch ${wish.packageName}`, () => unpackDebianPackage(wish.packageName));
  }
  const installed = await findDebianProgram(wish);
  if (!installed) {
    throw new LaunchError(
      'program_missing',
      `${wish.packageName} was installed, yet ${wish.title} is not where it is looked for.`,
    );
  }
  return installed;
}

async function findDebianProgram(wish: DebianWish): Promise<DebianProgram | undefined> {
  const ofSystem = wish.find('');
  if (ofSystem) return { path: ofSystem, env: {} };
  const root = unpackedRoot(wish.packageName);
  const unpacked = root && wish.find(root.folder);
  return unpacked ? { path: unpacked, env: root.env } : undefined;
}

/** How to become root without a question asked; undefined when there is no way. */
async function administratorPrefix(): Promise<string[] | undefined> {
  if (process.getuid?.() === 0) return ['env'];
  const sudo = await run('sudo', ['-n', 'true'], { timeoutMs: 10_000 });
  return sudo.code === 0 ? ['sudo', '-n', 'env'] : undefined;
}

async function installAsRoot(prefix: string[], packageName: string): Promise<CommandResult> {
  const quiet = ['DEBIAN_FRONTEND=noninteractive', 'NEEDRESTART_MODE=a'];
  const asRoot = (script: string, options: CommandOptions) =>
    run(prefix[0]!, [...prefix.slice(1), ...quiet, 'sh', '-c', script], options);

  const refreshed = await asRoot('apt-get -q update', { timeoutMs: 5 * 60_000 });
  // One unreachable third-party source makes "update" fail although Debian's own list came; try anyway.
  const installed = await asRoot(installScript(packageName), { timeoutMs: 15 * 60_000 });
  return installed.code === 0
    ? installed
    : { ...installed, stderr: `${refreshed.stderr}\n${installed.stderr}` };
}

/**
 * Debian's PostgreSQL makes and starts a cluster of its own on installation. Quartzhold brings its
 * own, so both are held back for the length of the installation and what was there is put back.
 */
function installScript(packageName: string): string {
  return `set -e
held=
if [ ! -e /usr/sbin/policy-rc.d ]; then
  printf '#!/bin/sh\\nexit 101\\n' > /usr/sbin/policy-rc.d
  chmod 755 /usr/sbin/policy-rc.d
  held=policy
fi
made=
if [ ! -e /etc/postgresql-common/createcluster.conf ] && [ ! -d /etc/postgresql-common ]; then
  mkdir -p /etc/postgresql-common
  printf 'create_main_cluster = false\\n' > /etc/postgresql-common/createcluster.conf
  made=yes
fi
put_back() {
  [ -z "$held" ] || rm -f /usr/sbin/policy-rc.d
  [ -z "$made" ] || printf '# create_main_cluster = true\\n' > /etc/postgresql-common/createcluster.conf
}
trap put_back EXIT
apt-get -q -y --no-install-recommends -o Dpkg::Options::=--force-confold -o Dpkg::Use-Pty=0 \\
  -o DPkg::Lock::Timeout=120 -o Acquire::Retries=2 install ${packageName}
`;
}

async function twice(what: string, attempt: () => Promise<CommandResult>): Promise<void> {
  const first = await attempt();
  if (first.code === 0) return;
  say(`Could not ${what} at the first try; trying once more ...`);
  const second = await attempt();
  if (second.code === 0) return;
  throw new LaunchError(
    'debian_failed',
    `Could not ${what} from Debian's packages:\n  ${lastWords(second.stderr)}`,
  );
}

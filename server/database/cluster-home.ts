import { createHash } from 'node:crypto';
import { chownSync, existsSync, mkdirSync, rmdirSync } from 'node:fs';
import { join } from 'node:path';
import { checkoutFolder, localFolder, makeLocalFolder } from '../launch/checkout';
import { LaunchError, run } from '../launch/command';
import { say } from '../launch/say';

/** The account PostgreSQL runs as. Empty for an ordinary user: then it is that user. */
export interface ServerAccount {
  uid?: number;
  gid?: number;
}

/** PostgreSQL refuses to run as root, so root hands it to the account its Debian package brings. */
export async function serverAccount(): Promise<ServerAccount> {
  if (process.getuid?.() !== 0) return {};
  const [uid, gid] = await Promise.all([id('-u'), id('-g')]);
  return { uid, gid };
}

async function id(which: string): Promise<number> {
  const answer = await run('id', [which, 'postgres']);
  if (answer.code !== 0) {
    throw new LaunchError(
      'no_postgres_user',
      'PostgreSQL does not run as root and this machine has no user "postgres": add one (useradd --system postgres) or start as an ordinary user.',
    );
  }
  return Number(answer.stdout.trim());
}

/** A folder the account may write: in the checkout, or, where it cannot get there, under /var/lib. */
export async function clusterHome(name: string, account: ServerAccount): Promise<string> {
  const inCheckout = join(localFolder, name);
  if (account.uid === undefined) {
    makeLocalFolder();
    mkdirSync(inCheckout, { recursive: true });
    return inCheckout;
  }
  makeLocalFolder();
  if (await ownedAndReachable(inCheckout, account)) return inCheckout;

  const mark = createHash('sha256').update(checkoutFolder).digest('hex').slice(0, 12);
  for (const parent of ['/var/lib', '/var/tmp']) {
    const outside = join(parent, `quartzhold-${mark}`, name);
    if (await ownedAndReachable(outside, account)) {
      say(`The user "postgres" cannot reach ${checkoutFolder}; the database lies in ${outside}.`);
      return outside;
    }
  }
  throw new LaunchError(
    'no_cluster_home',
    'Found no folder for the database that the user "postgres" can reach: move the checkout out of a closed folder such as /root.',
  );
}

async function ownedAndReachable(folder: string, account: ServerAccount): Promise<boolean> {
  const fresh = !existsSync(folder);
  try {
    mkdirSync(folder, { recursive: true });
    if (fresh) chownSync(folder, account.uid!, account.gid!);
  } catch {
    return false;
  }
  const probe = await run('test', ['-w', folder], { ...account, cwd: '/' });
  if (probe.code !== 0 && fresh) rmdirSync(folder);
  return probe.code === 0;
}

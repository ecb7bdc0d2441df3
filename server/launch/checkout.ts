import { chmodSync, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder this copy of Quartzhold lies in. */
export const checkoutFolder = fileURLToPath(new URL('../../', import.meta.url));

/** Everything Quartzhold makes for itself on this machine lies under here; git ignores it. */
export const localFolder = join(checkoutFolder, '.local');

/** Others may pass through (the database runs as its own user when root starts it); secrets inside are files of mode 600. */
export function makeLocalFolder(): void {
  mkdirSync(localFolder, { recursive: true });
  chmodSync(localFolder, 0o755);
}

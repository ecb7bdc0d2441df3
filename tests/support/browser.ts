import { existsSync } from 'node:fs';
import { chromium, type Browser } from 'playwright-core';
import { ensureDebianProgram, type DebianProgram } from '../../server/launch/debian';

/** Debian's Chromium, brought in if it is missing. */
export function ensureChromium(): Promise<DebianProgram> {
  return ensureDebianProgram({
    packageName: 'chromium',
    title: 'Chromium',
    find: (root) => {
      // Debian's /usr/bin/chromium is a script that knows only the installed place.
      const path = root ? `${root}/usr/lib/chromium/chromium` : '/usr/bin/chromium';
      return existsSync(path) ? path : undefined;
    },
  });
}

/** A headless browser with an empty profile of its own; close it when done. */
export async function launchBrowser(furtherArguments: readonly string[] = []): Promise<Browser> {
  const program = await ensureChromium();
  return chromium.launch({
    executablePath: program.path,
    env: { ...(process.env as Record<string, string>), ...(program.env as Record<string, string>) },
    headless: true,
    // Only pages of this machine's own server are opened, and containers often forbid the sandbox.
    args: [
      '--headless',
      '--no-sandbox',
      '--disable-gpu',
      '--disable-dev-shm-usage',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      '--font-render-hinting=none',
      ...furtherArguments,
    ],
  });
}

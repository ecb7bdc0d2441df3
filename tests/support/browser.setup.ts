import { ensureBuilt } from '../../server/launch/build';
import { ensureChromium } from './browser';

/** Vitest global setup of the browser suite: a browser and a built product are there. */
export default async function setup(): Promise<void> {
  await ensureChromium();
  await ensureBuilt('client', 'server');
}

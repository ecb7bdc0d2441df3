import { setTimeout as wait } from 'node:timers/promises';
import { LaunchError } from './command';

/** Waits until the server says that all it needs is there. */
export async function waitForHealth(address: string): Promise<void> {
  const deadline = Date.now() + 60_000;
  let last = 'no answer';
  while (Date.now() < deadline) {
    try {
      const answer = await fetch(`${address}/api/health`, { signal: AbortSignal.timeout(5_000) });
      last = `${answer.status} ${await answer.text()}`;
      if (answer.ok) return;
    } catch (error) {
      last = (error as Error).message;
    }
    await wait(150);
  }
  throw new LaunchError('not_healthy', `The server did not become healthy in a minute: ${last}`);
}

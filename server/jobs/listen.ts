import { type Pool, type PoolClient } from 'pg';

export interface Listener {
  stop(): Promise<void>;
}

const againAfterMs = 1000;

/**
 * Hears notifications of one channel over a connection kept for it, and connects again for as long as it takes after
 * the database went away. What was told meanwhile is not heard: whoever listens has to look by itself now and then.
 */
export function listen(
  pool: Pool,
  channel: string,
  onMessage: (payload: string) => void,
): Listener {
  let stopped = false;
  let client: PoolClient | null = null;
  let timer: NodeJS.Timeout | null = null;
  let connecting: Promise<void> = Promise.resolve();

  const again = () => {
    client = null;
    if (!stopped && !timer)
      timer = setTimeout(() => {
        timer = null;
        connecting = connect();
      }, againAfterMs);
  };
  const connect = async () => {
    try {
      const made = await pool.connect();
      if (stopped) {
        made.release();
        return;
      }
      client = made;
      made.on('notification', (message) => {
        if (message.channel === channel) onMessage(message.payload ?? '');
      });
      let gone = false;
      const lost = () => {
        if (gone) return;
        gone = true;
        made.release(true);
        again();
      };
      made.on('error', lost);
      made.on('end', lost);
      await made.query(`LISTEN ${channel}`);
    } catch {
      if (!client) again();
    }
  };
  connecting = connect();
  return {
    async stop() {
      stopped = true;
      if (timer) clearTimeout(timer);
      await connecting;
      const held = client;
      client = null;
      held
        ?.removeAllListeners('end')
        .removeAllListeners('error')
        .on('error', () => undefined);
      // Ended, not given back: a connection that listens is of no use to others.
      held?.release(true);
    },
  };
}

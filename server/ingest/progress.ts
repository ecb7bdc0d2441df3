import { type Pool } from 'pg';
import { LeaseLost } from './errors';
import { leaseSeconds, uploadsChannel } from './lease';

const INTERVAL_MS = 330;

export interface Counts {
  bytesRead: number;
  rows: number;
  taken: number;
  refused: number;
}

/**
 * Tells three times a second how far a load is, outside its transaction and on another connection, and renews the lease
 * with the same write. When the lease turns out to be lost, `lost` is set and the load has to stop.
 */
export class Progress {
  lost = false;
  private timer: NodeJS.Timeout | null = null;
  private running: Promise<void> = Promise.resolve();
  private readonly begun = performance.now();

  constructor(
    private readonly pool: Pool,
    private readonly uploadId: string,
    private readonly token: string,
    private readonly byteCount: number,
    private readonly counts: () => Counts,
  ) {}

  start(): void {
    this.timer = setInterval(() => {
      this.running = this.running.then(() => this.write('reading'));
    }, INTERVAL_MS);
  }

  /** No more writes after this has resolved. */
  async stop(stage: 'analysing' | null): Promise<void> {
    if (this.timer) clearInterval(this.timer);
    this.timer = null;
    await this.running;
    if (stage) await this.write(stage);
  }

  check(): void {
    if (this.lost) throw new LeaseLost();
  }

  private async write(stage: 'reading' | 'analysing'): Promise<void> {
    const { bytesRead, rows, taken, refused } = this.counts();
    const seconds = (performance.now() - this.begun) / 1000;
    const left = bytesRead > 0 ? (seconds / bytesRead) * (this.byteCount - bytesRead) : null;
    try {
      const { rowCount } = await this.pool.query(
        `WITH told AS (
           UPDATE uploads SET stage = $3, bytes_read = $4, rows_in_file = $5, rows_taken = $6, rows_refused = $7,
             rows_per_second = $8, seconds_left = $9, lease_until = now() + make_interval(secs => $10)
           WHERE id = $1 AND lease_token = $2 AND state = 'running' RETURNING id)
         SELECT pg_notify($11, id::text) FROM told`,
        [
          this.uploadId,
          this.token,
          stage,
          bytesRead,
          rows,
          taken,
          refused,
          rows / seconds,
          left,
          // Analysing happens under the row's lock, where no heartbeat can be written.
          stage === 'analysing' ? 20 * leaseSeconds : leaseSeconds,
          uploadsChannel,
        ],
      );
      if (rowCount === 0) this.lost = true;
    } catch {
      // A missed beat is no loss: the lease outlives several. The load itself notices a dead database.
    }
  }
}

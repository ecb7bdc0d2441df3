import { type Client } from 'pg';
import { from as copyFrom } from 'pg-copy-streams';

/** PostgreSQL's binary COPY: signature, flags, no header extension. */
const SIGNATURE = Buffer.from('PGCOPY\n\xff\r\n\0\0\0\0\0\0\0\0\0', 'latin1');
const TRAILER = Buffer.from([0xff, 0xff]);
const BLOCK = 512 * 1024;

/**
 * Sends rows by binary COPY over one connection. Rows are written straight into `buffer` at `at`; `need` makes room.
 * `flushed` is awaited between blocks of input, so that never more than a few blocks wait for the database.
 */
export class CopyWriter {
  buffer = Buffer.allocUnsafeSlow(BLOCK);
  at = 0;
  private stream: ReturnType<typeof copyFrom> | null = null;
  private failure: Error | null = null;
  private full = false;

  constructor(
    private readonly client: Client,
    private readonly sql: string,
    /** Sees every block of rows as it is sent. */
    private readonly onBlock: (block: Buffer) => void = () => undefined,
  ) {}

  need(bytes: number): void {
    if (this.at + bytes <= this.buffer.length) return;
    this.send();
    if (bytes > this.buffer.length) this.buffer = Buffer.allocUnsafeSlow(bytes);
  }

  get open(): boolean {
    return this.stream !== null;
  }

  /** Hands what was written to the connection, and waits while it is full. */
  async flushed(): Promise<void> {
    if (this.failure) throw this.failure;
    if (!this.full || !this.stream) return;
    const stream = this.stream;
    await new Promise<void>((resolve, reject) => {
      const done = (error?: Error) => {
        stream.off('drain', done);
        stream.off('error', done);
        if (error) reject(error);
        else resolve();
      };
      stream.once('drain', done);
      stream.once('error', done);
    });
    this.full = false;
  }

  /** Ends this COPY, if one was begun; the next row begins another. */
  async finish(): Promise<void> {
    if (this.at === 0 && !this.stream) return;
    this.send();
    const stream = this.stream!;
    if (this.failure) throw this.failure;
    await new Promise<void>((resolve, reject) => {
      stream.once('error', reject);
      stream.end(TRAILER, resolve);
    });
    this.stream = null;
    this.full = false;
  }

  /** Tells the database that the COPY failed and waits until the connection can be used again. */
  async abort(): Promise<void> {
    const stream = this.stream;
    this.stream = null;
    if (!stream || stream.destroyed) return;
    await new Promise<void>((resolve) => {
      stream.once('close', resolve);
      stream.destroy(new Error('The load was stopped.'));
    });
  }

  private send(): void {
    if (this.at === 0) return;
    if (!this.stream) {
      this.stream = this.client.query(copyFrom(this.sql, { highWaterMark: 4 * BLOCK }));
      this.stream.on('error', (error: Error) => (this.failure ??= error));
      this.stream.write(SIGNATURE);
    }
    const block = this.buffer.subarray(0, this.at);
    this.onBlock(block);
    this.full = !this.stream.write(block);
    this.buffer = Buffer.allocUnsafeSlow(BLOCK);
    this.at = 0;
  }
}

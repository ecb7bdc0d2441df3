import { type WhatIf } from '@shared/analysis/what-if';

interface Limits {
  lowPpm: number | null;
  highPpm: number | null;
}
export type LimitQuestion =
  { kind: 'offsets'; offsets: Float64Array } | { kind: 'limits'; limits: Limits };
export type LimitAnswer = { ok: true; outcome: WhatIf } | { ok: false; message: string };

/**
 * Computes a trial beside the page. While one answer is on its way only the newest question waits; those between are
 * answered with it, so that a drag never builds up a queue.
 */
export class LimitWorker {
  private readonly worker = new Worker(new URL('./limit-trial.worker.ts', import.meta.url), {
    type: 'module',
  });
  private waiting: { limits: Limits; tell: Teller[] } | null = null;
  private asked: Teller[] | null = null;

  constructor(offsets: Float64Array) {
    this.worker.onmessage = ({ data }: MessageEvent<LimitAnswer>) => this.answered(data);
    this.worker.onerror = ({ message }) => this.answered({ ok: false, message });
    this.worker.postMessage({ kind: 'offsets', offsets } satisfies LimitQuestion, [offsets.buffer]);
  }

  compute(limits: Limits): Promise<WhatIf> {
    return new Promise((resolve, reject) => {
      const tell: Teller = { resolve, reject };
      this.waiting = { limits, tell: [...(this.waiting?.tell ?? []), tell] };
      this.next();
    });
  }

  stop(): void {
    this.worker.terminate();
  }

  private next(): void {
    if (this.asked || !this.waiting) return;
    const { limits, tell } = this.waiting;
    this.asked = tell;
    this.waiting = null;
    this.worker.postMessage({ kind: 'limits', limits } satisfies LimitQuestion);
  }

  private answered(answer: LimitAnswer): void {
    const told = this.asked ?? [];
    this.asked = null;
    for (const { resolve, reject } of told) {
      if (answer.ok) resolve(answer.outcome);
      else reject(new Error(answer.message));
    }
    this.next();
  }
}

interface Teller {
  resolve: (outcome: WhatIf) => void;
  reject: (error: Error) => void;
}

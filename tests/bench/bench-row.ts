/** One measured way of doing the thing a bench is about. */
export interface BenchRow {
  name: string;
  /** One duration a run, in milliseconds. */
  runsMs: readonly number[];
  /** What was processed in a run, if a rate says more than a duration. */
  items?: { count: number; unit: string };
}

/** Runs `act` a few times after one unmeasured warm-up. */
export async function measure(
  name: string,
  act: () => unknown,
  options: { runs?: number; items?: BenchRow['items'] } = {},
): Promise<BenchRow> {
  await act();
  const runsMs: number[] = [];
  for (let run = 0; run < (options.runs ?? 5); run += 1) {
    const begin = performance.now();
    await act();
    runsMs.push(performance.now() - begin);
  }
  return { name, runsMs, items: options.items };
}

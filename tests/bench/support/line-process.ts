import { spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import { checkoutFolder } from '../../../server/launch/checkout';

export interface Analysed {
  ms: number;
  /** Of all threads of the process. */
  cpuMs: number;
  /** Greatest resident memory before the first analysis and by now, in MiB. */
  beforeMiB: number;
  peakMiB: number;
  figures: Record<string, number | null>;
}

export interface LineProcess {
  ask(order: string): Promise<Analysed>;
  stop(): Promise<void>;
}

/** A program that answers every line of its input with one line of JSON; ready once it has answered the first. */
export async function startLineProcess(
  command: string,
  args: string[],
  job: object,
  env: NodeJS.ProcessEnv = {},
): Promise<LineProcess> {
  const child = spawn(command, args, {
    cwd: checkoutFolder,
    env: { ...process.env, ...env },
    stdio: ['pipe', 'pipe', 'inherit'],
  });
  const ended = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  const ask = async (line: string) => {
    child.stdin.write(`${line}\n`);
    const { value, done } = await lines.next();
    if (done) throw new Error(`${command} ended before it answered.`);
    return JSON.parse(value as string) as Analysed;
  };
  await ask(JSON.stringify(job));
  return {
    ask,
    async stop() {
      child.stdin.end();
      await ended;
    },
  };
}

import { spawn } from 'node:child_process';

/** Something outside Quartzhold stands in the way of its start; the message says what to do. */
export class LaunchError extends Error {
  override readonly name = 'LaunchError';
  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}

export interface CommandOptions {
  cwd?: string;
  env?: NodeJS.ProcessEnv;
  uid?: number;
  gid?: number;
  timeoutMs?: number;
  input?: string;
  /** In a group of its own, where Ctrl-C in the terminal does not reach it halfway. */
  shielded?: boolean;
}

export interface CommandResult {
  /** 127 when the program is not there, 124 when it ran out of time. */
  code: number;
  stdout: string;
  stderr: string;
}

/** Runs a program to its end; never throws for a program that fails. */
export function run(
  program: string,
  args: readonly string[],
  options: CommandOptions = {},
): Promise<CommandResult> {
  return new Promise((resolve) => {
    let stdout = '';
    let stderr = '';
    let outOfTime = false;
    const child = spawn(program, args, {
      cwd: options.cwd,
      env: options.env ?? process.env,
      uid: options.uid,
      gid: options.gid,
      detached: options.shielded ?? false,
      stdio: ['pipe', 'pipe', 'pipe'],
    });
    const timer = setTimeout(() => {
      outOfTime = true;
      child.kill('SIGKILL');
    }, options.timeoutMs ?? 120_000);
    child.stdout.on('data', (chunk: Buffer) => (stdout += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (stderr += chunk.toString()));
    child.stdin.on('error', () => undefined);
    child.stdin.end(options.input ?? '');
    child.on('error', (error) => {
      clearTimeout(timer);
      resolve({ code: 127, stdout, stderr: error.message });
    });
    // 'exit', not 'close': a server started by the program may keep the pipes open.
    child.on('exit', (code) => {
      clearTimeout(timer);
      setImmediate(() => {
        child.stdout.destroy();
        child.stderr.destroy();
        resolve({ code: outOfTime ? 124 : (code ?? 1), stdout, stderr });
      });
    });
  });
}

/** As `run`, but a failure becomes a LaunchError that carries the program's own last words. */
export async function runOrStop(
  code: string,
  sentence: string,
  program: string,
  args: readonly string[],
  options: CommandOptions = {},
): Promise<string> {
  const result = await run(program, args, options);
  if (result.code === 0) return result.stdout;
  const words = lastWords(result.stderr.trim() || result.stdout);
  const why = result.code === 124 ? 'it ran out of time' : `exit code ${result.code}`;
  throw new LaunchError(code, `${sentence} (${program}: ${why})\n  ${words}`);
}

/** What a failed program said at the end, without stack traces. */
export function lastWords(text: string): string {
  const lines = text.split('\n').filter((line) => line.trim() && !/^\s+at .*\d\)?$/.test(line));
  return lines.slice(-12).join('\n  ');
}

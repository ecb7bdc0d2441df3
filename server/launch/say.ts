/** The launcher's voice: one plain line at a time. */
export function say(line: string): void {
  process.stdout.write(`${line}\n`);
}

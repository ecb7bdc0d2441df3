import { createWriteStream, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { once } from 'node:events';

/** Invented readings in the plain form, 16 MHz, offsets about ±8 ppm; the same for every run. */
export async function writeReadingsFile(rows: number): Promise<string> {
  const file = join(mkdtempSync(join(tmpdir(), 'quartzhold-bench-')), `readings-${rows}.csv`);
  const out = createWriteStream(file, { highWaterMark: 1024 * 1024 });
  out.write('serial,temperature_c,frequency_hz,measured_at\n');
  let state = 12345;
  const start = Date.UTC(2026, 10, 30, 6);
  let block = '';
  for (let n = 1; n <= rows; n += 1) {
    state = (Math.imul(state, 1103515245) + 12345) >>> 0;
    const milliHertz = 16_000_000_000 + (state % 256_000) - 128_000;
    const whole = Math.floor(milliHertz / 1000);
    const part = String(milliHertz % 1000).padStart(3, '0');
    block += `SN${String(n).padStart(8, '0')},25.0,${whole}.${part},${new Date(start + n * 100).toISOString()}\n`;
    if (n % 10_000 === 0 || n === rows) {
      if (!out.write(block)) await once(out, 'drain');
      block = '';
    }
  }
  out.end();
  await once(out, 'close');
  return file;
}

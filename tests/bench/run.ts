import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { checkoutFolder } from '../../server/launch/checkout';
import { type BenchRow } from './bench-row';
import { ratioTable } from './ratio-table';

/*
 * npm run bench               every tests/bench/*.bench.ts, one after the other
 * npm run bench -- ingest     those whose name contains the word
 *
 * A bench file exports by default an async function that returns its rows; the first row is what
 * the others are compared with. Ratios are printed, never judged: a slow machine fails no test.
 */
const folder = join(checkoutFolder, 'tests/bench');
const words = process.argv.slice(2);
const files = readdirSync(folder)
  .filter((name) => name.endsWith('.bench.ts'))
  .filter((name) => words.length === 0 || words.some((word) => name.includes(word)))
  .sort();
if (files.length === 0) {
  console.error(words.length ? `No bench is called ${words.join(' ')}.` : 'There is no bench.');
  process.exit(1);
}
for (const file of files) {
  const bench = (await import(pathToFileURL(join(folder, file)).href)) as {
    default: () => Promise<BenchRow[]>;
  };
  console.log(`\n${file.replace('.bench.ts', '')}`);
  console.log(ratioTable(await bench.default()));
}

import { mkdirSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';
import { corpusCases } from './cases';

/*
 * node --import tsx tests/ingest/make-corpus.ts [folder]
 * Writes every file of the corpus, to look at one or to send one to a running server. Tests make them in memory.
 */
const folder = process.argv[2] ?? fileURLToPath(new URL('./corpus', import.meta.url));
mkdirSync(folder, { recursive: true });
for (const { name, bytes } of corpusCases()) writeFileSync(`${folder}/${name}.csv`, bytes);
writeFileSync(`${folder}/packed.csv.gz`, gzipSync(corpusCases()[0]!.bytes));

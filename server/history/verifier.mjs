#!/usr/bin/env node
// Checks an export of the Quartzhold history off line: node verifier.mjs export.json [checkpoint.json ...]
// Needs Node.js only; shares no code with the server, so that it can be read and rewritten by anyone.
//
// An export is {manifest, entries}. Each entry holds sequence, previousHash, hash and payload (text).
//   hash = SHA-256, hex, of the UTF-8 text   sequence LF previousHash LF payload
// The first previousHash of all is 64 zeros. A filtered export has gaps: then each entry is checked by itself, and
// neighbours in the chain are checked against each other.
// A checkpoint is {count, head, at, signature, publicKey}; Ed25519 over
//   "quartzhold history checkpoint" LF count LF head LF at LF
import { createHash, createPublicKey, verify } from 'node:crypto';
import { readFileSync } from 'node:fs';

const sha256 = (text) => createHash('sha256').update(text, 'utf8').digest('hex');

function fail(sequence, reason) {
  console.log(`BROKEN at entry ${sequence}: ${reason}`);
  process.exit(1);
}

const [exportFile, ...checkpointFiles] = process.argv.slice(2);
if (!exportFile) {
  console.error('usage: node verifier.mjs export.json [checkpoint.json ...]');
  process.exit(2);
}
let manifest, entries;
try {
  ({ manifest, entries } = JSON.parse(readFileSync(exportFile, 'utf8')));
  if (!manifest || !Array.isArray(entries)) throw new Error('it has no manifest or no entries');
} catch (error) {
  console.error(`${exportFile} is not an export of the history: ${error.message}`);
  process.exit(2);
}

let previous = null;
for (const entry of entries) {
  const { sequence, previousHash, hash, payload } = entry;
  if (previous && sequence <= previous.sequence) fail(sequence, 'out of order or twice');
  if (sha256(`${sequence}\n${previousHash}\n${payload}`) !== hash)
    fail(sequence, 'its content does not match its hash');
  if (sequence === 1 && previousHash !== '0'.repeat(64))
    fail(sequence, 'the first entry must follow 64 zeros');
  if (previous && sequence === previous.sequence + 1 && previousHash !== previous.hash)
    fail(sequence, 'does not follow the entry before it');
  if (manifest.complete && sequence !== (previous?.sequence ?? 0) + 1)
    fail((previous?.sequence ?? 0) + 1, 'missing from an export that says it is complete');
  previous = entry;
}
if (entries.length !== manifest.count)
  fail(
    entries.length + 1,
    `the manifest counts ${manifest.count} entries, the file holds ${entries.length}`,
  );
if (entries.length > 0) {
  if (entries[0].hash !== manifest.firstHash)
    fail(entries[0].sequence, 'is not the first entry that the manifest names');
  if (previous.hash !== manifest.lastHash)
    fail(previous.sequence, 'is not the last entry that the manifest names');
}

const bySequence = new Map(entries.map((entry) => [entry.sequence, entry.hash]));
let compared = 0;
for (const checkpoint of [
  ...(manifest.checkpoints ?? []),
  ...checkpointFiles.map((file) => JSON.parse(readFileSync(file, 'utf8'))),
]) {
  const text = `quartzhold history checkpoint\n${checkpoint.count}\n${checkpoint.head}\n${checkpoint.at}\n`;
  if (
    !verify(
      null,
      Buffer.from(text),
      createPublicKey(checkpoint.publicKey),
      Buffer.from(checkpoint.signature, 'base64'),
    )
  ) {
    fail(checkpoint.count, 'a checkpoint carries a signature that does not fit');
  }
  if (manifest.complete && checkpoint.count > entries.length)
    fail(
      entries.length + 1,
      `a checkpoint counted ${checkpoint.count} entries: the newest are missing`,
    );
  const head = bySequence.get(checkpoint.count);
  if (head !== undefined) {
    if (head !== checkpoint.head)
      fail(checkpoint.count, 'differs from a checkpoint made when it was the newest');
    compared += 1;
  }
}
console.log(
  `OK: ${entries.length} entries hold together${manifest.complete ? ', none missing between them' : ' (a filtered export: entries between them were left out)'}.`,
);
console.log(
  `${compared} checkpoints agree. Filter: ${JSON.stringify(manifest.filter)}. Exported ${manifest.exportedAt}.`,
);
console.log(
  'Not proved: that nothing came after the last entry here, nor that what people wrote was true.',
);

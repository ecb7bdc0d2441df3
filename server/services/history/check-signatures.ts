import { type FindOptions, Op } from 'sequelize';
import { canonicalJson, sha256Hex } from '../../history/canonical';
import { Analysis, Disposition, Signature } from '../../models';
import { verifySignature } from '../signing/sign';

export interface SignatureCheck {
  signaturesChecked: number;
  analysesChecked: number;
  /** What no longer fits, in a sentence each; at most a hundred. */
  faults: string[];
}

const batch = 500;
const mostFaults = 100;

/** Whether every signature still fits its record, every decision its signature, and every frozen analysis its hashes. */
export async function checkSignatures(): Promise<SignatureCheck> {
  const check: SignatureCheck = { signaturesChecked: 0, analysesChecked: 0, faults: [] };
  const fault = (sentence: string) => {
    if (check.faults.length < mostFaults) check.faults.push(sentence);
  };
  await inBatches(
    (page) => Signature.findAll(page),
    async (signatures) => {
      check.signaturesChecked += signatures.length;
      for (const signature of signatures)
        if (!verifySignature(signature))
          fault(
            `Signature ${signature.id} on ${signature.recordType} ${signature.recordId} does not fit what it stands on.`,
          );
    },
  );
  await inBatches(
    (page) => Disposition.findAll(page),
    async (dispositions) => {
      const signatures = await Signature.findAll({
        attributes: ['recordId', 'contentHash'],
        where: { recordType: 'disposition', recordId: dispositions.map(({ id }) => id) },
      });
      for (const { id, contentHash } of dispositions)
        if (!signatures.some((s) => s.recordId === id && s.contentHash === contentHash))
          fault(`Decision ${id} does not carry the signature it was made with.`);
    },
  );
  await inBatches(
    (page) => Analysis.findAll(page),
    async (analyses) => {
      check.analysesChecked += analyses.length;
      for (const { id, resultText, resultHash, criteria, criteriaHash } of analyses)
        if (
          sha256Hex(resultText) !== resultHash ||
          sha256Hex(canonicalJson(criteria)) !== criteriaHash
        )
          fault(`Analysis ${id}, on which a decision was signed, was changed.`);
    },
    { frozenAt: { [Op.ne]: null } },
  );
  return check;
}

async function inBatches<Row extends { id: string }>(
  read: (page: FindOptions) => Promise<Row[]>,
  look: (rows: Row[]) => Promise<void>,
  where: object = {},
): Promise<void> {
  let last: string | null = null;
  for (;;) {
    const rows: Row[] = await read({
      where: { ...where, ...(last ? { id: { [Op.gt]: last } } : {}) },
      order: ['id'],
      limit: batch,
    });
    if (rows.length > 0) await look(rows);
    if (rows.length < batch) return;
    last = rows.at(-1)!.id;
  }
}

import { type Response } from 'express';
import { type AnalysisResult } from '@shared/contract/analysis';
import { canonicalJson, sha256Hex } from '../../history/canonical';
import { Conflict, NotFound } from '../../http/errors';
import { Analysis, Disposition, Lot, Signature } from '../../models';
import { type CertificateContent, type SignedContent } from '../../reports/certificate/content';
import { makeCertificate } from '../../reports/certificate/make-certificate';
import { verifySignature } from '../signing/sign';

/** 409: there is nothing signed that a certificate could state. */
class NoCertificate extends Conflict {
  constructor(sentence: string) {
    super('certificate.none', sentence);
  }
}

/** The decision asked for, or the one that counts now. */
async function certified(lotId: string, dispositionId?: string): Promise<Disposition> {
  const decisions = await Disposition.findAll({ where: { lotId }, order: [['number', 'DESC']] });
  const wanted = dispositionId
    ? decisions.find((decision) => decision.id === dispositionId)
    : (decisions.find((decision) => decision.state === 'in_force') ??
      decisions.find((decision) => decision.state === 'awaiting_second'));
  if (!wanted && dispositionId) throw new NotFound('This decision');
  if (!wanted)
    throw new NoCertificate(
      decisions.length === 0
        ? 'No decision is signed on this lot yet, so there is nothing to certify.'
        : 'No signed decision counts on this lot now. Sign one, or ask for the certificate of an earlier one.',
    );
  if (wanted.state === 'awaiting_second')
    throw new NoCertificate(
      'The concession waits for its second signature. Its certificate can be had once it is signed.',
    );
  if (wanted.state === 'refused')
    throw new NoCertificate('This concession was refused and never counted.');
  return wanted;
}

/** Gathers what was frozen and proves, before a certificate says so, that it is still what was signed. */
export async function certificateContent(
  lotId: string,
  dispositionId?: string,
): Promise<CertificateContent> {
  const disposition = await certified(lotId, dispositionId);
  const analysis = (await Analysis.findByPk(disposition.analysisId))!;
  const signatures = await Signature.findAll({
    where: { recordType: 'disposition', recordId: disposition.id },
    order: ['signedAt', 'id'],
  });
  const [first] = signatures;
  const whole =
    first !== undefined &&
    first.contentHash === disposition.contentHash &&
    signatures.every(verifySignature) &&
    sha256Hex(analysis.resultText) === analysis.resultHash &&
    sha256Hex(canonicalJson(analysis.criteria)) === analysis.criteriaHash;
  const content = first && (JSON.parse(first.contentText) as SignedContent & Signed);
  if (
    !whole ||
    content?.analysis.resultHash !== analysis.resultHash ||
    content.analysis.criteriaHash !== analysis.criteriaHash ||
    content.analysis.inputHash !== analysis.inputHash
  )
    throw new Conflict(
      'certificate.broken',
      'What is stored no longer fits what was signed, so it is not certified. Tell your auditor.',
    );
  return {
    decisionNumber: disposition.number,
    signed: content,
    result: JSON.parse(analysis.resultText) as AnalysisResult,
    criteria: analysis.criteria,
    analysisVersion: analysis.version,
    methodVersion: analysis.methodVersion,
    hashes: {
      input: analysis.inputHash,
      criteria: analysis.criteriaHash,
      result: analysis.resultHash,
    },
    signatures,
  };
}

interface Signed {
  analysis: { inputHash: string; criteriaHash: string; resultHash: string };
}

export async function writeCertificate(
  lotId: string,
  dispositionId: string | undefined,
  response: Response,
): Promise<void> {
  if (!(await Lot.findByPk(lotId, { attributes: ['id'] }))) throw new NotFound('This lot');
  const content = await certificateContent(lotId, dispositionId);
  const bytes = await makeCertificate(content);
  const name = content.signed.lot.lotNumber.replace(/[^A-Za-z0-9._-]+/g, '-');
  response
    .type('application/pdf')
    .attachment(`certificate-${name}-${content.decisionNumber}.pdf`)
    .send(bytes);
}

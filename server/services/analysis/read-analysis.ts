import { type Response } from 'express';
import { database } from '../../database/connection';
import { NotFound } from '../../http/errors';
import { Analysis, Disposition, Lot, Signature } from '../../models';
import { presentAnalysis } from '../../presenters/analysis';
import { presentSignature } from '../../presenters/signature';

export async function readAnalysis(lotId: string, analysisId?: string) {
  const lot = await Lot.findByPk(lotId);
  if (!lot) throw new NotFound('This lot');
  const id = analysisId ?? lot.currentAnalysisId;
  const analysis = id ? await Analysis.findOne({ where: { id, lotId } }) : null;
  if (!analysis) throw new NotFound(analysisId ? 'This analysis' : 'An analysis of this lot');
  return presentAnalysis(analysis, lot);
}

export async function readAnalyses(lotId: string) {
  const lot = await Lot.findByPk(lotId);
  if (!lot) throw new NotFound('This lot');
  const analyses = await Analysis.findAll({
    where: { lotId },
    attributes: { exclude: ['resultText', 'criteria'] },
    order: [['version', 'DESC']],
  });
  return {
    items: analyses.map((a) => ({
      id: a.id,
      version: a.version,
      createdAt: a.createdAt.toISOString(),
      frozenAt: a.frozenAt?.toISOString() ?? null,
      superseded: a.id !== lot.currentAnalysisId,
      inputHash: a.inputHash,
      resultHash: a.resultHash,
    })),
    next: null,
  };
}

/** Eight bytes a unit: the browser computes from them what other limits would mean. */
export async function writeOffsets(analysisId: string, response: Response): Promise<void> {
  const { rows } = await database().pool.query<{ bytes: Buffer }>(
    'SELECT bytes FROM analysis_offsets WHERE analysis_id = $1',
    [analysisId],
  );
  if (!rows[0]) throw new NotFound('This analysis');
  response
    .type('application/octet-stream')
    .set('Content-Disposition', 'attachment; filename="offsets-ppm-float64-le.bin"')
    .send(rows[0].bytes);
}

/** The frozen text, the criteria, hashes and signatures: what an auditor takes away to recompute. */
export async function writeAnalysisExport(analysisId: string, response: Response): Promise<void> {
  const analysis = await Analysis.findByPk(analysisId);
  if (!analysis) throw new NotFound('This analysis');
  const dispositions = await Disposition.findAll({ where: { analysisId } });
  const signatures = await Signature.findAll({
    where: { recordType: 'disposition', recordId: dispositions.map((d) => d.id) },
    order: ['signedAt'],
  });
  const {
    id,
    lotId,
    version,
    methodVersion,
    inputHash,
    criteria,
    criteriaHash,
    resultText,
    resultHash,
    frozenAt,
    createdAt,
  } = analysis;
  response.attachment(`analysis-${id}.json`).json({
    id,
    lotId,
    version,
    methodVersion,
    createdAt,
    frozenAt,
    inputHash,
    criteriaHash,
    resultHash,
    criteria,
    resultText,
    signatures: signatures.map((signature) => ({
      ...presentSignature(signature),
      contentText: signature.contentText,
    })),
  });
}

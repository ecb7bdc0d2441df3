import { inTransaction } from '../../database/connection';
import { Analysis } from '../../models';
import { analyseLot } from '../../services/analysis/analyse-lot';
import { lockLot } from '../../services/lots/find-lot';

/**
 * Queue `analyse`: analyses a lot again after a withdrawal, a change of criteria, or an analysis that failed. When the
 * analysis of these readings and criteria is there already nothing is done: who looks at it may be about to sign it.
 */
export async function handleAnalyse({ lotId }: { lotId: string }): Promise<void> {
  await inTransaction(async (transaction) => {
    const lot = await lockLot(lotId, transaction);
    const current = lot.currentAnalysisId
      ? await Analysis.findByPk(lot.currentAnalysisId, {
          attributes: ['dataVersion'],
          transaction,
        })
      : null;
    if (current?.dataVersion !== lot.dataVersion) await analyseLot(transaction, lotId);
  });
}

import { inTransaction } from '../../database/connection';
import { analyseLot } from '../../services/analysis/analyse-lot';

/** Queue `analyse`: analyses a lot again after a withdrawal, a change of criteria, or an analysis that failed. */
export async function handleAnalyse(data: { lotId: string }): Promise<void> {
  await inTransaction((transaction) => analyseLot(transaction, data.lotId));
}

import * as contract from '@shared/contract/analysis';
import { route } from '../http/route';
import {
  readAnalyses,
  readAnalysis,
  writeAnalysisExport,
  writeOffsets,
} from '../services/analysis/read-analysis';

export const analysisRoutes = [
  route(contract.readAnalysis, ({ params, query }) => readAnalysis(params.id, query.analysisId)),
  route(contract.listAnalyses, ({ params }) => readAnalyses(params.id)),
  route(contract.readOffsets, ({ params, response }) => writeOffsets(params.id, response)),
  route(contract.exportAnalysis, ({ params, response }) =>
    writeAnalysisExport(params.id, response),
  ),
];

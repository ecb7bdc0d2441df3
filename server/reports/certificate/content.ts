import { type AnalysisCriteria } from '@shared/analysis/criteria';
import { type AnalysisResult } from '@shared/contract/analysis';
import { type Decision } from '@shared/contract/dispositions';

/** What a signer saw, as the signature keeps it; members that came later are missing in older ones. */
export interface SignedContent {
  lot: {
    lotNumber: string;
    lotSize: number;
    dateCode: string;
    purchaseOrder: string;
    receivedOn: string;
  };
  supplierName?: string;
  deviceKind?: string;
  decision: Decision;
  reason: string;
  treatment: 'return_to_supplier' | 'scrap' | null;
  concession: {
    greatestQuantity: number | null;
    until: string | null;
    nonconformity: string;
    customerReference: string;
  } | null;
  correction: string;
  seen: { caution: string };
}

export interface CertificateSignature {
  printedName: string;
  role: string;
  meaning: string;
  reason: string;
  signedAt: Date;
  zone: string;
  contentHash: string;
}

/** Everything a certificate says. Made of the frozen analysis and the signatures alone, so that it never changes. */
export interface CertificateContent {
  decisionNumber: number;
  signed: SignedContent;
  result: AnalysisResult;
  criteria: AnalysisCriteria;
  analysisVersion: number;
  methodVersion: string;
  hashes: { input: string; criteria: string; result: string };
  /** In the order they were given. */
  signatures: CertificateSignature[];
}

import { type Mapping } from '@shared/contract/uploads';
import { InvalidInput } from '../../http/errors';
import { FileRefused } from '../../ingest/errors';
import { limits } from '../../ingest/limits';
import { type Content, lookAtContent } from '../../ingest/propose/content';
import { proposeMapping } from '../../ingest/propose/propose-mapping';
import { sampleRecords } from '../../ingest/propose/records';
import { decodePrefix } from '../../ingest/propose/encoding';
import { type Lot, PartRevision } from '../../models';
import { savedMappingFor } from './saved-mappings';

/** What a file is, with a refusal of the whole file told as an error of the request. */
export function contentOf(prefix: Buffer): Content {
  try {
    return lookAtContent(prefix, prefix.length < limits.prefixBytes);
  } catch (error) {
    if (error instanceof FileRefused)
      throw new InvalidInput(error.message, { file: error.message }, error.code);
    throw error;
  }
}

export async function nominalOf(lot: Lot): Promise<string> {
  const revision = await PartRevision.findByPk(lot.partRevisionId);
  return revision!.criteria.nominalFrequencyHz;
}

/**
 * How an uploaded file is read: as the person said, else as it was saved for this supplier and these headings, else as
 * the headings say beyond doubt. Doubt is not guessed away: it needs the check step.
 */
export async function decideMapping(
  prefix: Buffer,
  lot: Lot,
  given: Mapping | null,
): Promise<{ mapping: Mapping; headings: string[] | null }> {
  const content = contentOf(prefix);
  if (given) {
    if (!given.columns.some((column) => column.target === 'frequency'))
      throw new InvalidInput('The mapping names no column that holds the frequency.', {
        mapping: 'Choose the column with the frequency.',
      });
    return { mapping: given, headings: headingsBy(content, given) };
  }
  let proposal;
  try {
    proposal = await proposeMapping(content, await nominalOf(lot), {
      known: async (headings) => (await savedMappingFor(lot.supplierId, headings))?.mapping ?? null,
    });
  } catch (error) {
    if (error instanceof FileRefused)
      throw new InvalidInput(error.message, { file: error.message }, error.code);
    throw error;
  }
  const [question] = proposal.questions;
  if (question)
    throw new InvalidInput(
      `It is not certain how to read this file. ${question.text} Answer it in the check step, or send a mapping.`,
      { mapping: question.text },
      'upload.mapping_needed',
    );
  return { mapping: proposal.mapping, headings: proposal.headings };
}

function headingsBy(content: Content, mapping: Mapping): string[] | null {
  if (!mapping.headerRow) return null;
  const text = Buffer.from(decodePrefix(content.text, mapping.encoding), 'utf8');
  return sampleRecords(text, mapping.delimiter, 1)[0]?.fields ?? null;
}

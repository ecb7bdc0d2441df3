import { type UploadCheck, Mapping } from '@shared/contract/uploads';
import { proposeColumns } from './columns';
import { type Content } from './content';
import { proposeDecimalSign } from './decimal-sign';
import { proposeDelimiter } from './delimiter';
import { decodePrefix, proposeEncoding } from './encoding';
import { meaningOf } from './headings';
import { type SampleRecord, sampleRecords } from './records';

type Question = UploadCheck['questions'][number];

export const plainHeadings = ['serial', 'temperature_c', 'frequency_hz', 'measured_at'];

export interface Proposal {
  mapping: Mapping;
  headings: string[] | null;
  /** Records after the header. */
  records: SampleRecord[];
  questions: Question[];
}

const SAMPLES = 200;

/**
 * How a file would be read, from its first bytes. Everything is a proposal; what cannot be known is a question. `given`
 * is what the person chose already; `known` looks for a mapping saved for these headings.
 */
export async function proposeMapping(
  content: Content,
  nominalHz: string,
  options: {
    given?: Mapping | null;
    known?: (headings: string[]) => Promise<Mapping | null>;
  } = {},
): Promise<Proposal> {
  const { given } = options;
  const questions: Question[] = [];
  const encoding = proposeEncoding(content.text, content.complete);
  const readAs = given?.encoding ?? encoding.encoding;
  if (!encoding.sure && !given)
    questions.push({
      field: 'encoding',
      text: 'The file is not UTF-8. In which encoding was it written?',
      choices: [
        { value: 'windows-1252', label: 'Windows-1252 (Western European)' },
        { value: 'utf-16le', label: 'UTF-16, little endian' },
        { value: 'utf-16be', label: 'UTF-16, big endian' },
      ],
    });
  const decoded = decodePrefix(content.text, readAs);
  const text = Buffer.from(content.complete ? decoded : wholeLines(decoded), 'utf8');
  const cut = proposeDelimiter(text);
  const delimiter = given?.delimiter ?? cut.delimiter;
  if (cut.decimalCommaPossible && !given)
    questions.push({
      field: 'delimiter',
      text: 'Does the comma separate two columns, or is it the decimal sign of one?',
      choices: [
        { value: ',', label: 'Two columns' },
        { value: ';', label: 'One column with decimal commas' },
      ],
    });
  const all = sampleRecords(text, delimiter, SAMPLES);
  const first = all[0]?.fields ?? [];
  const isPlain = plainHeadings.join() === first.join() && delimiter === ',';
  const headerRow = given?.headerRow ?? looksLikeHeader(all);
  const headings = headerRow ? first : null;
  const records = headerRow ? all.slice(1) : all;
  const rows = records.map(({ fields }) => fields);

  if (isPlain && !given)
    return { mapping: plainMapping(readAs), headings: first, records, questions };
  const known = !given && headings ? await options.known?.(headings) : null;
  if (known && known.columns.length >= first.length - 1)
    return {
      mapping: { ...known, encoding: encoding.sure ? readAs : known.encoding },
      headings,
      records,
      questions: [],
    };

  const sign = proposeDecimalSign(rows, delimiter);
  const decimalSign = given?.decimalSign ?? sign.decimalSign;
  if (sign.ambiguous && !given)
    questions.push({
      field: 'decimalSign',
      text: `Does “${sign.ambiguous}” mean ${sign.ambiguous.replace(/[.,]/, '')} or ${sign.ambiguous.replace(',', '.')}?`,
      choices: [
        { value: '.', label: 'The point is the decimal sign' },
        { value: ',', label: 'The comma is the decimal sign' },
      ],
    });
  const proposed = proposeColumns(headings, rows, decimalSign, nominalHz);
  const fits = given && given.columns.length === proposed.columns.length;
  const columns = fits ? given.columns : proposed.columns;
  const shape = fits ? given.shape : proposed.shape;
  if (!fits) {
    for (const column of proposed.unsureUnits)
      questions.push({
        field: 'unit',
        text: `In which unit are the values of ${headings?.[column] || `column ${column + 1}`}?`,
        choices: ['Hz', 'kHz', 'MHz', 'ppm', 'ppb'].map((value) => ({ value, label: value })),
      });
  }
  if (!columns.some((column) => column.target === 'frequency'))
    questions.push({
      field: 'columns',
      text: 'Which column holds the frequency, or the offset from nominal?',
      choices: columns.map((_, index) => ({
        value: String(index),
        label: headings?.[index] || `Column ${index + 1}`,
      })),
    });
  return {
    mapping: Mapping.parse({
      ...given,
      encoding: readAs,
      delimiter,
      decimalSign,
      headerRow,
      shape,
      columns,
    }),
    headings,
    records,
    questions,
  };
}

export function plainMapping(encoding: Mapping['encoding'] = 'utf-8'): Mapping {
  return Mapping.parse({
    encoding,
    columns: [
      { target: 'serial' },
      { target: 'temperature' },
      { target: 'frequency', unit: 'Hz' },
      { target: 'measuredAt' },
    ],
  });
}

/** A heading is known by its words, or by being text above numbers. */
function looksLikeHeader(records: SampleRecord[]): boolean {
  const first = records[0]?.fields ?? [];
  const isNumber = (text: string) => /^[+-]?[\d.,]*\d[\d.,]*([eE][+-]?\d+)?$/.test(text);
  if (first.some((field) => !isNumber(field) && meaningOf(field) !== null)) return true;
  if (first.some((field) => isNumber(field))) return false;
  const second = records[1]?.fields ?? [];
  return second.some((field) => isNumber(field));
}

/** Without the line that the end of the prefix cut. */
function wholeLines(text: string): string {
  const end = Math.max(text.lastIndexOf('\n'), text.lastIndexOf('\r'));
  return end === -1 ? text : text.slice(0, end + 1);
}

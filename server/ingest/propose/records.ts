import { limits } from '../limits';
import { RecordReader } from '../record-reader';

export interface SampleRecord {
  fields: string[];
  fileLine: number;
}

/** The first records of a text that are not blank, read by the same reader that will load the file. */
export function sampleRecords(text: Buffer, delimiter: string, most: number): SampleRecord[] {
  const records: SampleRecord[] = [];
  const enough = new Error('enough');
  const reader = new RecordReader(delimiter.charCodeAt(0), {
    record(bytes, bounds, count, fileLine) {
      const fields: string[] = [];
      for (let i = 0; i < Math.min(count, limits.columns); i += 1)
        fields.push(bytes.toString('utf8', bounds[2 * i], bounds[2 * i + 1]).trim());
      if (
        fields.every((field) => field === '') ||
        /^# end of export: \d+ rows$/.test(fields.join(''))
      )
        return;
      records.push({ fields, fileLine });
      if (records.length >= most) throw enough;
    },
    broken() {},
  });
  try {
    reader.push(text);
    reader.end();
  } catch (error) {
    if (error !== enough) throw error;
  }
  return records;
}

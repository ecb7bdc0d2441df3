import { type Mapping } from '@shared/contract/uploads';
import { REFERENCE_WINDOW_K, UnitCollector } from '@shared/analysis/units';
import { formatDecimal, parseDecimal } from '@shared/radio/decimal';
import { makeOffsetPpm } from '@shared/radio/offset-reader';
import { toHzText } from '@shared/radio/units';
import { type CopyWriter } from './copy-writer';
import { writeNumeric } from './decimal-bytes';
import { InstantReader } from './instant-bytes';
import { limits } from './limits';
import { plainNumber } from './plain-number';
import { putInt16, putInt32, putInt64 } from './put-bytes';
import { type FieldPlan, hasFixedTemperature, planFields, readingColumns } from './reading-columns';
import { type Refusal, asRecord, storable } from './refusals';
import { withoutTextMark } from './serial-text';
import { UnitTable, hashBytes, hashWhole } from './unit-table';

export interface JudgeOptions {
  mapping: Mapping;
  uploadNumber: number;
  nominalHz: string;
  referenceTemperatureC: number;
  requiredTemperaturesC: readonly number[];
  repeatReadings: 'refuse' | 'repeat';
  /** Whether this file alone makes up the lot's readings, so far as is known. */
  gather: boolean;
  /** Outside it no temperature of this bench can lie; null: unknown. */
  chamber: { lowC: number | null; highC: number | null };
}

/** A row that seems to repeat an earlier one; proved in SQL once everything is loaded. */
export interface Suspect {
  fileLine: number;
  serial: string;
  temperature: string | null;
  /** Microseconds since 2000, for a series. */
  measuredAt: number | null;
}

/** Farther from nominal than any quartz: a wrong unit or a wrong part rather than a bad unit. */
const IMPLAUSIBLE_PPM = 50_000;
const SPACE = 32;
const TAB = 9;

class Refused {
  constructor(
    readonly rule: string,
    readonly reason: string,
    readonly field: number,
  ) {}
}

/**
 * Decides on each record: into readings, or refused with line, column, text and rule. Works on the bytes of the file and
 * writes binary COPY rows at once; only what is out of the ordinary becomes a string.
 */
export class RowJudge {
  rows = 0;
  taken = 0;
  refusedCount = 0;
  readings = 0;
  implausible = 0;
  outsideChamber = 0;
  /** The count that an export of ours carries at its end; null when there is none. */
  announcedRows: number | null = null;
  refusals: Refusal[] = [];
  suspects: Suspect[] = [];
  readonly units = new UnitTable();
  /**
   * What the analysis needs, gathered while rows pass by, as long as every unit has one reading at the reference
   * temperature; null once that is not so, and the analysis reads the table instead.
   */
  gathered: UnitCollector | null;
  resistances = 0;
  readonly columnNames: string[];

  private readonly plan: FieldPlan;
  private readonly columnsSent: number;
  private readonly sends: { fileColumn: boolean; temperature: boolean; time: boolean };
  private readonly offset;
  private readonly instants = new InstantReader();
  private readonly series: boolean;
  /** Numbers with a decimal point can be taken as bytes; with a comma they are read as text, where a point means something else. */
  private readonly pointed: boolean;
  private expected: number;
  private readonly delimiter: string;
  private readonly startedAtMicros: number;
  private readonly scratch = Buffer.alloc(512);
  private readonly fixedSerial: Buffer;
  /** Most bytes that one record can become; all its readings lie in one block, so that they can be taken back. */
  private readonly rowBytes: number;
  private readonly referenceCondition: number;
  /** The temperature of the row before, as text, as numeric and as condition. */
  private temperatureText = Buffer.alloc(0);
  private temperatureNumeric = Buffer.alloc(0);
  private temperatureCondition = 0;
  private temperatureOutside = false;
  private temperatureIsReference = false;
  /** Offset of the frequency written last. */
  private ppm = 0;
  private temperaturePlain = '';

  constructor(
    private readonly options: JudgeOptions,
    private readonly writer: CopyWriter,
  ) {
    const { mapping } = options;
    this.plan = planFields(mapping);
    const columns = readingColumns(mapping);
    this.columnsSent = columns.length;
    this.sends = {
      fileColumn: columns.includes('file_column'),
      temperature: columns.includes('temperature_c'),
      time: columns.includes('measured_at'),
    };
    this.offset = makeOffsetPpm(options.nominalHz);
    this.series = mapping.shape === 'time_series';
    this.pointed = mapping.decimalSign === '.';
    this.expected = mapping.columns.length;
    this.delimiter = mapping.delimiter;
    this.columnNames = mapping.columns.map((_, index) => `column ${index + 1}`);
    const atOtherLoads = mapping.columns.some((column) => column.target === 'loadCapacitance');
    this.gathered =
      options.gather && !this.series && !atOtherLoads && this.plan.frequencies.length === 1
        ? new UnitCollector(options.referenceTemperatureC, options.requiredTemperaturesC)
        : null;
    this.rowBytes =
      this.plan.frequencies.length *
      (300 + 4 * limits.serialCharacters + 60 * this.plan.extras.length);
    this.fixedSerial = Buffer.from(mapping.serial.trim(), 'utf8');
    // Without a start the times count from the epoch of 1970: only their differences mean something then.
    const start = Buffer.from(mapping.startedAt ?? '1970-01-01T00:00:00Z', 'utf8');
    this.startedAtMicros = this.instants.read(start, 0, start.length);
    this.referenceCondition = this.conditionOf(String(options.referenceTemperatureC));
  }

  /** Names of columns for refusals, from the header; more columns than mapped are an error of the file as a whole. */
  useHeader(names: string[]): void {
    this.expected = names.length;
    names.forEach((name, index) => {
      this.columnNames[index] = name.trim() || `column ${index + 1}`;
    });
  }

  conditionOf(temperature: string): number {
    const canonical = Buffer.from(formatDecimal(parseDecimal(temperature)), 'latin1');
    return hashBytes(canonical, 0, canonical.length);
  }

  record(bytes: Buffer, bounds: Int32Array, count: number, fileLine: number): void {
    if (this.isBlank(bytes, bounds, count) || this.isTrailer(bytes, bounds, count)) return;
    this.rows += 1;
    const { writer } = this;
    writer.need(this.rowBytes);
    const mark = writer.at;
    try {
      if (count !== this.expected) {
        throw new Refused(
          'columns',
          `The row has ${count} columns where ${this.expected} are expected.`,
          -1,
        );
      }
      this.write(bytes, bounds, fileLine);
      this.taken += 1;
    } catch (refused) {
      if (!(refused instanceof Refused)) throw refused;
      writer.at = mark;
      this.refuse(refused, fields(bytes, bounds, count), fileLine);
    }
  }

  broken(bytes: Buffer, start: number, end: number, fileLine: number, rule: string): void {
    this.rows += 1;
    const text = bytes.toString('utf8', start, Math.min(end, start + limits.keptCharacters));
    const tooLong = rule === 'line.too_long';
    this.refuse(
      new Refused(
        rule,
        tooLong
          ? `The line is longer than ${limits.recordBytes / 1024} KiB.`
          : 'A quote is opened and never closed, or closed in the middle of a field.',
        -1,
      ),
      tooLong ? [text] : text.split(this.delimiter),
      fileLine,
    );
  }

  private refuse(refused: Refused, values: string[], fileLine: number): void {
    this.refusedCount += 1;
    this.refusals.push({
      fileLine,
      column: refused.field >= 0 ? storable(this.columnNames[refused.field] ?? '') : '',
      text: storable(
        refused.field >= 0 ? (values[refused.field] ?? '') : values.join(this.delimiter),
      ),
      rule: refused.rule,
      reason: storable(refused.reason),
      rawLine: storable(asRecord(values, this.delimiter)),
    });
  }

  private isBlank(bytes: Buffer, bounds: Int32Array, count: number): boolean {
    // Almost every row is settled by its first byte.
    if (count <= limits.columns) {
      for (let field = 0; field < count; field += 1) {
        for (let p = bounds[2 * field]!; p < bounds[2 * field + 1]!; p += 1)
          if (bytes[p] !== SPACE && bytes[p] !== TAB) return false;
      }
      return true;
    }
    return false;
  }

  /** `# end of export: 1000 rows`, the last line of our own exports. */
  private isTrailer(bytes: Buffer, bounds: Int32Array, count: number): boolean {
    if (bytes[bounds[0]!] !== 35 || count > limits.columns) return false;
    for (let field = 1; field < count; field += 1)
      if (bounds[2 * field] !== bounds[2 * field + 1]) return false;
    const found = /^# end of export: (\d{1,12}) rows\s*$/.exec(
      bytes.toString('latin1', bounds[0], bounds[1]),
    );
    if (!found) return false;
    this.announcedRows = Number(found[1]);
    return true;
  }

  private write(bytes: Buffer, bounds: Int32Array, fileLine: number): void {
    const { plan, writer, options } = this;
    const { frequencies, extras } = plan;
    let serialBytes = bytes;
    let serialStart = 0;
    let serialEnd: number;
    if (plan.serial >= 0) {
      serialStart = trimStart(bytes, bounds[2 * plan.serial]!, bounds[2 * plan.serial + 1]!);
      serialEnd = trimEnd(bytes, serialStart, bounds[2 * plan.serial + 1]!);
      if (!isPlainSerial(bytes, serialStart, serialEnd)) {
        serialBytes = this.unusualSerial(bytes, serialStart, serialEnd);
        serialStart = 0;
        serialEnd = serialBytes.length;
      }
    } else if (this.series && this.fixedSerial.length) {
      serialBytes = this.fixedSerial;
      serialEnd = serialBytes.length;
    } else {
      serialBytes = Buffer.from(`${options.mapping.serial.trim()}${this.rows}`, 'utf8');
      serialEnd = serialBytes.length;
    }

    let micros = NaN;
    if (plan.measuredAt >= 0) micros = this.readTime(bytes, bounds, plan.measuredAt);
    else if (plan.elapsedSeconds >= 0)
      micros = this.readElapsed(bytes, bounds, plan.elapsedSeconds);

    let given = 0;
    // A row of several readings counts as seen only when all of it is taken.
    const conditions: number[] = [];
    for (const { field, unit, temperatureC } of frequencies) {
      const start = trimStart(bytes, bounds[2 * field]!, bounds[2 * field + 1]!);
      const end = trimEnd(bytes, start, bounds[2 * field + 1]!);
      if (start === end) {
        if (frequencies.length > 1) continue;
        throw new Refused('frequency.missing', 'The frequency is missing.', field);
      }
      given += 1;
      const hasTemperature = this.readTemperature(bytes, bounds, temperatureC);
      const condition = this.series
        ? hashWhole(Number.isNaN(micros) ? 0 : micros)
        : hasTemperature
          ? this.temperatureCondition
          : this.referenceCondition;

      const out = writer.buffer;
      let at = putInt16(out, writer.at, this.columnsSent);
      at = putInt32(out, at, 4);
      at = putInt32(out, at, options.uploadNumber);
      at = putInt32(out, at, 4);
      at = putInt32(out, at, fileLine);
      if (this.sends.fileColumn) {
        at = putInt32(out, at, 2);
        at = putInt16(out, at, field + 1);
      }
      at = putInt32(out, at, serialEnd - serialStart);
      for (let p = serialStart; p < serialEnd; p += 1) out[at++] = serialBytes[p]!;
      if (this.sends.temperature) {
        if (hasTemperature) {
          const { temperatureNumeric } = this;
          at = putInt32(out, at, temperatureNumeric.length);
          for (let p = 0; p < temperatureNumeric.length; p += 1) out[at++] = temperatureNumeric[p]!;
        } else at = putInt32(out, at, -1);
      }
      at = this.writeFrequency(out, at, bytes, start, end, unit, field);
      if (this.sends.time) {
        if (Number.isNaN(micros)) at = putInt32(out, at, -1);
        else {
          at = putInt32(out, at, 8);
          at = putInt64(out, at, micros);
        }
      }
      let resistance = false;
      for (const extra of extras) {
        const before = at;
        at = this.writeExtra(out, at, bytes, bounds, extra.field);
        if (extra.column === 'resistance_ohm') resistance = at > before + 4;
      }
      writer.at = at;

      if (frequencies.length > 1) conditions.push(condition);
      const sighting =
        frequencies.length > 1
          ? this.units.knows(serialBytes, serialStart, serialEnd, condition) && 'known'
          : this.units.see(serialBytes, serialStart, serialEnd, condition);
      if (sighting === 'known' && options.repeatReadings === 'refuse') {
        this.suspects.push({
          fileLine,
          serial: serialBytes.toString('utf8', serialStart, serialEnd),
          temperature: hasTemperature ? this.temperaturePlain : null,
          measuredAt: this.series ? (Number.isNaN(micros) ? null : micros) : null,
        });
        throw new Refused(
          'duplicate',
          this.series
            ? 'This unit was read at this moment already.'
            : 'This unit was read at this temperature already, and the part takes no repeat readings.',
          plan.serial >= 0 ? plan.serial : field,
        );
      }
      if (hasTemperature && this.temperatureOutside) this.outsideChamber += 1;
      if (this.gathered) {
        if (sighting !== 'new_unit' || (hasTemperature && !this.temperatureIsReference))
          this.gathered = null;
        else {
          this.gathered.addSingle(this.ppm, options.uploadNumber, fileLine);
          if (resistance) this.resistances += 1;
        }
      }
    }
    if (given === 0)
      throw new Refused('frequency.missing', 'The row holds no frequency.', frequencies[0]!.field);
    for (const condition of conditions)
      this.units.see(serialBytes, serialStart, serialEnd, condition);
    this.readings += given;
  }

  private writeFrequency(
    out: Buffer,
    at: number,
    bytes: Buffer,
    start: number,
    end: number,
    unit: string,
    field: number,
  ): number {
    let source = bytes;
    let from = start;
    let to = end;
    let next = unit === 'Hz' && this.pointed ? writeNumeric(out, at + 4, bytes, start, end) : -1;
    if (next === -1) {
      const plain = this.plain(bytes, start, end, field);
      const hz = unit === 'Hz' ? plain : toHzText(plain, unit as 'MHz', this.options.nominalHz);
      source = this.scratch;
      from = 0;
      to = this.scratch.write(hz, 0, 'latin1');
      next = writeNumeric(out, at + 4, source, from, to);
      if (next === -1)
        throw new Refused('number.too_long', 'The frequency has too many digits.', field);
    }
    // The groups decide: none is zero; a sign says negative.
    if (out[at + 4] === 0 && out[at + 5] === 0)
      throw new Refused('frequency.not_positive', 'A frequency must be above zero.', field);
    if (out[at + 8] !== 0)
      throw new Refused('frequency.not_positive', 'A frequency must be above zero.', field);
    if (source[from] === 43) from += 1;
    const ppm = this.offset.ofBytes(source, from, to);
    this.ppm = ppm;
    if (ppm > IMPLAUSIBLE_PPM || ppm < -IMPLAUSIBLE_PPM) this.implausible += 1;
    putInt32(out, at, next - at - 4);
    return next;
  }

  private writeExtra(
    out: Buffer,
    at: number,
    bytes: Buffer,
    bounds: Int32Array,
    field: number,
  ): number {
    const start = trimStart(bytes, bounds[2 * field]!, bounds[2 * field + 1]!);
    const end = trimEnd(bytes, start, bounds[2 * field + 1]!);
    if (start === end) return putInt32(out, at, -1);
    let next = this.pointed ? writeNumeric(out, at + 4, bytes, start, end) : -1;
    if (next === -1) {
      const length = this.scratch.write(this.plain(bytes, start, end, field), 0, 'latin1');
      next = writeNumeric(out, at + 4, this.scratch, 0, length);
      if (next === -1) throw new Refused('number.too_long', 'The number is too long.', field);
    }
    putInt32(out, at, next - at - 4);
    return next;
  }

  /** Puts the row's temperature into `temperatureNumeric`; false when there is none. */
  private readTemperature(bytes: Buffer, bounds: Int32Array, ofColumn: number | null): boolean {
    const { plan } = this;
    const { mapping } = this.options;
    if (ofColumn !== null) return this.keepTemperature(String(ofColumn), -1);
    if (plan.temperature < 0) {
      return (
        hasFixedTemperature(mapping, plan) &&
        mapping.temperatureC !== null &&
        this.keepTemperature(String(mapping.temperatureC), -1)
      );
    }
    const start = trimStart(
      bytes,
      bounds[2 * plan.temperature]!,
      bounds[2 * plan.temperature + 1]!,
    );
    const end = trimEnd(bytes, start, bounds[2 * plan.temperature + 1]!);
    if (start === end) {
      return (
        mapping.temperatureC !== null && this.keepTemperature(String(mapping.temperatureC), -1)
      );
    }
    const known = this.temperatureText;
    let same = known.length === end - start;
    for (let p = 0; same && p < known.length; p += 1) same = known[p] === bytes[start + p];
    if (same) return true;
    this.keepTemperature(this.plain(bytes, start, end, plan.temperature), plan.temperature);
    this.temperatureText = Buffer.from(bytes.subarray(start, end));
    return true;
  }

  private keepTemperature(plain: string, field: number): boolean {
    if (plain === this.temperaturePlain && this.temperatureNumeric.length) {
      this.temperatureText = Buffer.alloc(0);
      return true;
    }
    const celsius = Number(plain);
    if (!(celsius >= -273.15 && celsius <= 1000)) {
      throw new Refused(
        'temperature.impossible',
        `${plain} °C is no temperature of a measurement.`,
        field,
      );
    }
    const text = Buffer.from(plain, 'latin1');
    const out = Buffer.alloc(64);
    const end = writeNumeric(out, 0, text, 0, text.length);
    if (end === -1) throw new Refused('number.too_long', 'The temperature is too long.', field);
    const { lowC, highC } = this.options.chamber;
    this.temperatureNumeric = out.subarray(0, end);
    this.temperatureCondition = this.conditionOf(plain);
    this.temperatureOutside =
      (lowC !== null && celsius < lowC) || (highC !== null && celsius > highC);
    this.temperatureIsReference =
      Math.abs(celsius - this.options.referenceTemperatureC) <= REFERENCE_WINDOW_K;
    this.temperaturePlain = plain;
    this.temperatureText = Buffer.alloc(0);
    return true;
  }

  private readTime(bytes: Buffer, bounds: Int32Array, field: number): number {
    const start = trimStart(bytes, bounds[2 * field]!, bounds[2 * field + 1]!);
    const end = trimEnd(bytes, start, bounds[2 * field + 1]!);
    if (start === end) return NaN;
    const micros = this.instants.read(bytes, start, end);
    if (Number.isNaN(micros)) {
      throw new Refused(
        'time.not_iso',
        'The time is not written as 2026-11-30T12:05:09Z (ISO 8601).',
        field,
      );
    }
    return micros;
  }

  private readElapsed(bytes: Buffer, bounds: Int32Array, field: number): number {
    const start = trimStart(bytes, bounds[2 * field]!, bounds[2 * field + 1]!);
    const end = trimEnd(bytes, start, bounds[2 * field + 1]!);
    if (start === end) throw new Refused('time.missing', 'The elapsed time is missing.', field);
    const seconds = Number(this.plain(bytes, start, end, field));
    if (!(Math.abs(seconds) < 1e10))
      throw new Refused('time.out_of_range', 'The elapsed time is too long.', field);
    return this.startedAtMicros + Math.round(seconds * 1e6);
  }

  private plain(bytes: Buffer, start: number, end: number, field: number): string {
    const number = plainNumber(
      bytes.toString('utf8', start, Math.min(end, start + 200)),
      this.options.mapping.decimalSign,
    );
    if (!number.ok) throw new Refused(number.rule, number.reason, field);
    return number.plain;
  }

  private unusualSerial(bytes: Buffer, start: number, end: number): Buffer {
    const { plan } = this;
    if (start === end) throw new Refused('serial.missing', 'The serial is missing.', plan.serial);
    const text = withoutTextMark(bytes.toString('utf8', start, end));
    // eslint-disable-next-line no-control-regex
    if (/[\u0000-\u001f\u007f-\u009f\u2028\u2029]/.test(text))
      throw new Refused('serial.control', 'The serial holds a control character.', plan.serial);
    if (text.length > limits.serialCharacters) {
      throw new Refused(
        'serial.too_long',
        `The serial is longer than ${limits.serialCharacters} characters.`,
        plan.serial,
      );
    }
    return Buffer.from(text, 'utf8');
  }
}

function fields(bytes: Buffer, bounds: Int32Array, count: number): string[] {
  const values: string[] = [];
  for (let field = 0; field < Math.min(count, limits.columns); field += 1)
    values.push(bytes.toString('utf8', bounds[2 * field], bounds[2 * field + 1]));
  return values;
}

function trimStart(bytes: Buffer, start: number, end: number): number {
  while (start < end && (bytes[start] === SPACE || bytes[start] === TAB)) start += 1;
  return start;
}

function trimEnd(bytes: Buffer, start: number, end: number): number {
  while (end > start && (bytes[end - 1] === SPACE || bytes[end - 1] === TAB)) end -= 1;
  return end;
}

/** Printable ASCII of bearable length that does not begin with an apostrophe. */
function isPlainSerial(bytes: Buffer, start: number, end: number): boolean {
  const length = end - start;
  if (length === 0 || length > limits.serialCharacters || bytes[start] === 39) return false;
  for (let p = start; p < end; p += 1) {
    const byte = bytes[p]!;
    if (byte < SPACE || byte > 126) return false;
  }
  return true;
}

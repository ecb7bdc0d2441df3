import { requireCount } from '../statistics/checks';

/** A reading within this many kelvin of the reference temperature counts as read there (common practice). */
export const REFERENCE_WINDOW_K = 2;
/** A unit read this often over time is also looked at as a time series. */
const LEAST_SERIES = 16;
/** Curves kept for drawing; figures are made from all. */
const MOST_CURVES = 24;

/** One reading of a unit. Offsets in ppm from nominal. */
export interface UnitReading {
  offsetPpm: number;
  /** Null: read at the reference temperature. */
  temperatureC: number | null;
  measuredAtMs: number | null;
  resistanceOhm: number | null;
  fileLine: number;
  uploadNumber: number;
}

/** Where a unit stands in its file, so that its serial can be looked up when it is needed. */
export interface UnitPlace {
  uploadNumber: number;
  fileLine: number;
}

export interface UnitCurve {
  place: UnitPlace;
  temperaturesC: number[];
  offsetsPpm: number[];
  resistancesOhm: number[] | null;
}

export interface UnitSeries {
  place: UnitPlace;
  timesMs: number[];
  offsetsPpm: number[];
}

/** What a lot's readings come to, one offset a unit. */
export interface MeasuredUnits {
  readings: number;
  /** Offset at the reference temperature, in order of arrival; the mean where a unit was read more than once. */
  offsetsPpm: Float64Array;
  /** Parallel to `offsetsPpm`. */
  uploadNumbers: Int32Array;
  fileLines: Int32Array;
  /** Units read at other temperatures only: they have no offset to judge. */
  unitsWithoutReference: number;
  unitsLackingTemperatures: number;
  temperature: TemperatureReadings | null;
  series: UnitSeries | null;
}

export interface TemperatureReadings {
  unitsCount: number;
  curves: UnitCurve[];
  /** Offsets of all units by temperature, rounded to whole degrees. */
  byTemperature: Map<number, number[]>;
  /** All of them; `curves` is what a page draws. */
  everyCurve: UnitCurve[];
}

/** Gathers units one by one; the caller hands over all readings of a unit at once. */
export class UnitCollector {
  private offsets = new Float64Array(1024);
  private uploads = new Int32Array(1024);
  private lines = new Int32Array(1024);
  private count = 0;
  private readings = 0;
  private withoutReference = 0;
  private lacking = 0;
  private readonly curves: UnitCurve[] = [];
  private readonly byTemperature = new Map<number, number[]>();
  private series: UnitSeries | null = null;

  constructor(
    private readonly referenceTemperatureC: number,
    private readonly requiredTemperaturesC: readonly number[] = [],
  ) {}

  /** The fast path: a unit with one reading at the reference temperature. */
  addSingle(offsetPpm: number, uploadNumber: number, fileLine: number): void {
    if (this.count === this.offsets.length) this.grow();
    this.offsets[this.count] = offsetPpm;
    this.uploads[this.count] = uploadNumber;
    this.lines[this.count] = fileLine;
    this.count += 1;
    this.readings += 1;
    if (this.requiredTemperaturesC.some((t) => !this.isReference(t))) this.lacking += 1;
  }

  /** @param readings all readings of one unit, in the order of its files */
  addUnit(readings: readonly UnitReading[]): void {
    requireCount(readings.length, 'readings', 1);
    const first = readings[0]!;
    const atReference = readings.filter(({ temperatureC }) => this.isReference(temperatureC));
    if (readings.length === 1 && atReference.length === 1) {
      this.addSingle(first.offsetPpm, first.uploadNumber, first.fileLine);
      return;
    }
    this.readings += readings.length;
    if (
      this.requiredTemperaturesC.some(
        (wanted) => !readings.some((r) => this.isNear(r.temperatureC, wanted)),
      )
    )
      this.lacking += 1;
    if (atReference.length === 0) this.withoutReference += 1;
    else {
      const mean =
        atReference.reduce((sum, { offsetPpm }) => sum + (offsetPpm - first.offsetPpm), 0) /
        atReference.length;
      this.readings -= 1;
      const lacking = this.lacking;
      this.addSingle(
        first.offsetPpm + mean,
        atReference[0]!.uploadNumber,
        atReference[0]!.fileLine,
      );
      this.lacking = lacking;
    }
    this.keepSeries(atReference);
    this.keepCurve(readings);
  }

  finish(): MeasuredUnits {
    return {
      readings: this.readings,
      offsetsPpm: this.offsets.subarray(0, this.count),
      uploadNumbers: this.uploads.subarray(0, this.count),
      fileLines: this.lines.subarray(0, this.count),
      unitsWithoutReference: this.withoutReference,
      unitsLackingTemperatures: this.lacking,
      temperature: this.curves.length
        ? {
            unitsCount: this.curves.length,
            curves: this.curves.slice(0, MOST_CURVES),
            byTemperature: this.byTemperature,
            everyCurve: this.curves,
          }
        : null,
      series: this.series,
    };
  }

  private isReference(temperatureC: number | null): boolean {
    return this.isNear(temperatureC, this.referenceTemperatureC);
  }

  private isNear(temperatureC: number | null, wantedC: number): boolean {
    return Math.abs((temperatureC ?? this.referenceTemperatureC) - wantedC) <= REFERENCE_WINDOW_K;
  }

  private keepSeries(readings: readonly UnitReading[]): void {
    const timed = readings.filter(({ measuredAtMs }) => measuredAtMs !== null);
    if (timed.length < LEAST_SERIES || timed.length <= (this.series?.timesMs.length ?? 0)) return;
    timed.sort((a, b) => a.measuredAtMs! - b.measuredAtMs!);
    this.series = {
      place: { uploadNumber: timed[0]!.uploadNumber, fileLine: timed[0]!.fileLine },
      timesMs: timed.map((r) => r.measuredAtMs!),
      offsetsPpm: timed.map((r) => r.offsetPpm),
    };
  }

  private keepCurve(readings: readonly UnitReading[]): void {
    const points = readings
      .map((r) => ({ ...r, temperatureC: r.temperatureC ?? this.referenceTemperatureC }))
      .sort((a, b) => a.temperatureC - b.temperatureC);
    const span = points.at(-1)!.temperatureC - points[0]!.temperatureC;
    if (span <= 2 * REFERENCE_WINDOW_K) return;
    for (const { temperatureC, offsetPpm } of points) {
      const key = Math.round(temperatureC);
      const there = this.byTemperature.get(key);
      if (there) there.push(offsetPpm);
      else this.byTemperature.set(key, [offsetPpm]);
    }
    const resistances = points.map((p) => p.resistanceOhm);
    this.curves.push({
      place: { uploadNumber: points[0]!.uploadNumber, fileLine: points[0]!.fileLine },
      temperaturesC: points.map((p) => p.temperatureC),
      offsetsPpm: points.map((p) => p.offsetPpm),
      resistancesOhm: resistances.every((r) => r !== null) ? (resistances as number[]) : null,
    });
  }

  private grow(): void {
    const size = this.offsets.length * 2;
    const grown = <A extends Float64Array | Int32Array>(next: A, old: A): A => {
      next.set(old as never);
      return next;
    };
    this.offsets = grown(new Float64Array(size), this.offsets);
    this.uploads = grown(new Int32Array(size), this.uploads);
    this.lines = grown(new Int32Array(size), this.lines);
  }
}

/** What a band strip is drawn from: one lot's offsets against its part's limits and its receiver's allowance. All in ppm. */
export interface BandStripInput {
  unitsCount: number;
  /** Null while no unit is measured. */
  meanPpm: number | null;
  /** Null below two units. */
  sdPpm: number | null;
  /** Null where the specification leaves this side open. */
  lowLimitPpm: number | null;
  highLimitPpm: number | null;
  /** Width of the guard band inside each limit; 0 for simple acceptance. */
  guardBandPpm: number;
  /** What the receiver bears; null where no receiver is tied to the part. */
  allowanceLowPpm: number | null;
  allowanceHighPpm: number | null;
  /** `edgesPpm` holds one value more than `counts`. */
  histogram: { edgesPpm: readonly number[]; counts: readonly number[] };
  /** Offsets of the units beyond a limit; may be cut short for a very bad lot. */
  beyondPpm: readonly number[];
  /** How many are beyond in truth. */
  beyondCount: number;
}

export type BandStripSize = 'row' | 'page';
export type Side = 'low' | 'high';

/** A unit beyond a limit: one dot, never shared. `stemY` is set for the lowest dot of a pile. */
export interface BeyondMark {
  side: Side;
  ppm: number;
  x: number;
  y: number;
  stemY: number | null;
  offScale: boolean;
}

/** Something one can point at, in reading order from left to right. */
export interface BandStripFeature {
  kind: 'allowance' | 'limit' | 'mean' | 'beyond';
  side: Side | null;
  ppm: number;
  x: number;
}

export interface BandStripGeometry {
  size: BandStripSize;
  width: number;
  height: number;
  axis: { x1: number; x2: number; y: number };
  /** Where the axis is cut because something lies far outside. */
  breaks: number[];
  zeroX: number | null;
  brackets: {
    side: Side;
    ppm: number;
    x: number;
    top: number;
    bottom: number;
    lip: number;
    offScale: boolean;
  }[];
  posts: { side: Side; ppm: number; x: number; top: number; bottom: number }[];
  guards: { side: Side; x1: number; x2: number; top: number; bottom: number }[];
  bars: { x: number; y: number; width: number; height: number; count: number }[];
  meanX: number | null;
  dotRadius: number;
  marks: BeyondMark[];
  /** Units beyond that found no room of their own; written as a number at the end of their side. */
  overflow: { side: Side; count: number; x: number; y: number }[];
  /** Axis values with their place, already thinned so that none overlap (page size only). */
  labels: {
    ppm: number;
    x: number;
    y: number;
    anchor: 'start' | 'middle' | 'end';
    withUnit: boolean;
  }[];
  captionX: number | null;
  features: BandStripFeature[];
  isEmpty: boolean;
}

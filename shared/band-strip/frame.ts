import { type BandStripSize } from './types';

/** Fixed measures of the two sizes, in CSS pixels. */
export interface Frame {
  height: number;
  axisY: number;
  barTop: number;
  bracketTop: number;
  postTop: number;
  lip: number;
  endPad: number;
  dotRadius: number;
  dotPitch: number;
  stem: number;
  /** Room kept past the axis break for units far outside. */
  lane: number;
  /** Room kept for "+213" when not every unit beyond finds a place. */
  overflowRoom: number;
  minBar: number;
  fontSize: number;
  labelY: number | null;
}

const frames: Record<BandStripSize, Frame> = {
  row: {
    height: 36,
    axisY: 30,
    barTop: 5,
    bracketTop: 1,
    postTop: 3,
    lip: 4,
    endPad: 12,
    dotRadius: 1.8,
    dotPitch: 5,
    stem: 8,
    lane: 20,
    overflowRoom: 30,
    minBar: 4,
    fontSize: 11,
    labelY: null,
  },
  page: {
    height: 84,
    axisY: 60,
    barTop: 8,
    bracketTop: 2,
    postTop: 4,
    lip: 5,
    endPad: 44,
    dotRadius: 2.4,
    dotPitch: 6.5,
    stem: 13,
    lane: 96,
    overflowRoom: 48,
    minBar: 5,
    fontSize: 12,
    labelY: 79,
  },
};

/** On a narrow page the ends are kept shorter, so that the lot itself keeps its room. */
export function frameFor(size: BandStripSize, width: number): Frame {
  const frame = frames[size];
  return size === 'page' && width < 640 ? { ...frame, endPad: 24, lane: 34 } : frame;
}

/** Where a value lies on the histogram's axis, and back; the plot leaves `PLOT_MARGIN` at each side. */
export const PLOT_MARGIN = 4;

export interface AxisView {
  lowPpm: number;
  highPpm: number;
  /** Shown part, percent of the whole axis. */
  zoom: { start: number; end: number };
  widthPx: number;
}

function shown({ lowPpm, highPpm, zoom }: AxisView) {
  const span = highPpm - lowPpm;
  return {
    from: lowPpm + (zoom.start / 100) * span,
    to: lowPpm + (zoom.end / 100) * span,
  };
}

/** Null where zooming has moved the value out of sight. */
export function pixelAt(view: AxisView, ppm: number): number | null {
  const { from, to } = shown(view);
  if (ppm < from || ppm > to) return null;
  return PLOT_MARGIN + ((ppm - from) / (to - from)) * (view.widthPx - 2 * PLOT_MARGIN);
}

export function ppmAt(view: AxisView, px: number): number {
  const { from, to } = shown(view);
  const share = (px - PLOT_MARGIN) / (view.widthPx - 2 * PLOT_MARGIN);
  return from + Math.min(1, Math.max(0, share)) * (to - from);
}

/** A round step of about a three-hundredth of the axis: what one arrow key moves, and where dragging snaps. */
export function limitStep({ lowPpm, highPpm }: Pick<AxisView, 'lowPpm' | 'highPpm'>): number {
  const raw = (highPpm - lowPpm) / 300;
  const power = 10 ** Math.floor(Math.log10(raw));
  return [1, 2, 5, 10].map((m) => m * power).find((step) => step >= raw)!;
}

export function snapped(ppm: number, step: number): number {
  return Number((Math.round(ppm / step) * step).toPrecision(12));
}

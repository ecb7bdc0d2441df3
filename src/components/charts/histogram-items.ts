import { type CustomSeriesRenderItemAPI } from 'echarts';
import { hatch } from '@shared/band-strip/shapes';
import { formatNumber } from '@shared/format/number';
import { ppm as ppmText } from '@shared/format/ppm';
import { type BandStripInput } from '@shared/band-strip/types';
import { chartFont, type ChartColours } from './useChartTheme';

type Chart = CustomSeriesRenderItemAPI;

/** A bin across a limit is painted in two colours, cut at the limit. A bin with one unit stays visible. */
export function renderBin(chart: Chart, input: BandStripInput, colours: ChartColours) {
  const from = Number(chart.value(0));
  const to = Number(chart.value(1));
  const units = Number(chart.value(2));
  if (units === 0) return { type: 'group' as const, children: [] };
  const low = input.lowLimitPpm ?? -Infinity;
  const high = input.highLimitPpm ?? Infinity;
  const cuts = [from, ...[low, high].filter((limit) => limit > from && limit < to), to];
  const floor = chart.coord([0, 0])[1]!;
  const height = Math.max(3, floor - chart.coord([0, units])[1]!);
  return {
    type: 'group' as const,
    children: cuts.slice(1).map((end, index) => {
      const start = cuts[index]!;
      const isBeyond = start >= high || end <= low;
      const x = chart.coord([start, 0])[0]! + 0.5;
      const width = Math.max(1, chart.coord([end, 0])[0]! - x - 0.5);
      return {
        type: 'rect' as const,
        shape: { x, y: floor - height, width, height },
        style: { fill: isBeyond ? colours.rose : colours.bars },
        emphasis: { style: { fill: isBeyond ? colours.rose : colours.amethyst } },
      };
    }),
  };
}

/** Strokes at 45 degrees over [from, to], as on the band strip. */
export function renderGuard(chart: Chart, top: number, colours: ChartColours) {
  const [x1 = 0, y1 = 0] = chart.coord([Number(chart.value(0)), top]);
  const [x2 = 0, y2 = 0] = chart.coord([Number(chart.value(1)), 0]);
  return {
    type: 'group' as const,
    children: hatch(x1, x2, y1, y2, 6).map((stroke) => ({
      type: 'line' as const,
      shape: { x1: stroke.x1, y1: stroke.y1, x2: stroke.x2, y2: stroke.y2 },
      style: { stroke: colours.hatch, lineWidth: 0.75 },
    })),
  };
}

/** A limit: a post with its value above. */
export function renderPost(chart: Chart, top: number, colours: ChartColours) {
  const ppm = Number(chart.value(0));
  const [x = 0, y = 0] = chart.coord([ppm, top]);
  const floor = chart.coord([ppm, 0])[1]!;
  return {
    type: 'group' as const,
    children: [
      {
        type: 'line' as const,
        shape: { x1: x, y1: y, x2: x, y2: floor + 3 },
        style: { stroke: colours.ink, lineWidth: 2 },
      },
      valueText(x, y, formatNumber(ppm, { sign: 'always' }), colours.ink),
    ],
  };
}

/** An end of the receiver's allowance: a bracket that opens inward, with its value above. */
export function renderBracket(chart: Chart, top: number, colours: ChartColours) {
  const ppm = Number(chart.value(0));
  const inward = Number(chart.value(1));
  const [x = 0, y = 0] = chart.coord([ppm, top]);
  const floor = chart.coord([ppm, 0])[1]!;
  const lip = 5 * inward;
  return {
    type: 'group' as const,
    children: [
      {
        type: 'polyline' as const,
        shape: {
          points: [
            [x + lip, y],
            [x, y],
            [x, floor],
            [x + lip, floor],
          ],
        },
        style: { stroke: colours.amethyst, lineWidth: 1.75, fill: 'none' },
      },
      valueText(x, y, ppmText(ppm, { sign: 'always' }), colours.amethyst),
    ],
  };
}

function valueText(x: number, y: number, text: string, fill: string) {
  return {
    type: 'text' as const,
    x,
    y: y - 5,
    style: {
      text,
      fill,
      font: `12.5px ${chartFont}`,
      align: 'center' as const,
      verticalAlign: 'bottom' as const,
    },
  };
}

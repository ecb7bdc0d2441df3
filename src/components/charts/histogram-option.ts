import { type CustomSeriesRenderItemAPI, type CustomSeriesRenderItemParams } from 'echarts';
import { formatNumber } from '@shared/format/number';
import { count } from '@shared/format/counts';
import { type BandStripInput } from '@shared/band-strip/types';
import { baseOption, type ChartColours } from './useChartTheme';

export type Place = 'within' | 'beyond' | 'straddles';

export interface HistogramBin {
  fromPpm: number;
  toPpm: number;
  units: number;
  place: Place;
  /** Units expected in this bin if the lot were normal with its own mean and spread. */
  expected: number | null;
}

/** Units a normal lot would show at `ppm` in a bin `widthPpm` wide: n w phi(z) / s. */
function normalUnits(input: BandStripInput, ppm: number, widthPpm: number): number | null {
  const { meanPpm, sdPpm, unitsCount } = input;
  if (meanPpm === null || sdPpm === null || !(sdPpm > 0)) return null;
  const z = (ppm - meanPpm) / sdPpm;
  return (unitsCount * widthPpm * Math.exp((-z * z) / 2)) / (sdPpm * Math.sqrt(2 * Math.PI));
}

export function histogramBins(input: BandStripInput): HistogramBin[] {
  const { edgesPpm, counts } = input.histogram;
  const low = input.lowLimitPpm ?? -Infinity;
  const high = input.highLimitPpm ?? Infinity;
  return counts.map((units, index) => {
    const fromPpm = edgesPpm[index]!;
    const toPpm = edgesPpm[index + 1]!;
    const isBeyond = toPpm <= low || fromPpm >= high;
    const isWithin = fromPpm >= low && toPpm <= high;
    return {
      fromPpm,
      toPpm,
      units,
      place: isBeyond ? 'beyond' : isWithin ? 'within' : 'straddles',
      expected: normalUnits(input, (fromPpm + toPpm) / 2, toPpm - fromPpm),
    };
  });
}

/** Limits, allowance and every unit fit on the axis, with a margin. */
export function histogramRange(input: BandStripInput): { lowPpm: number; highPpm: number } {
  const { edgesPpm } = input.histogram;
  const ends = [
    input.lowLimitPpm,
    input.highLimitPpm,
    input.allowanceLowPpm,
    input.allowanceHighPpm,
    edgesPpm[0] ?? null,
    edgesPpm.at(-1) ?? null,
  ].filter((value) => value !== null);
  const low = Math.min(0, ...ends);
  const high = Math.max(0, ...ends);
  const margin = 0.05 * (high - low || 2);
  return { lowPpm: low - margin, highPpm: high + margin };
}

const signed = (value: number) => formatNumber(value, { sign: 'always' });

export function histogramOption(
  input: BandStripInput,
  colours: ChartColours,
  isStill: boolean,
  tip: (bin: HistogramBin) => string,
) {
  const base = baseOption(colours, isStill);
  const bins = histogramBins(input);
  const { lowPpm, highPpm } = histogramRange(input);
  const typicalWidth = medianWidth(bins);
  const curve = curvePoints(input, lowPpm, highPpm, typicalWidth);
  const top = Math.max(
    1,
    ...bins.map((bin) => perBin(bin, typicalWidth)),
    ...curve.map(([, units]) => units),
  );
  const limits = [input.lowLimitPpm, input.highLimitPpm].filter((value) => value !== null);
  const allowance = [input.allowanceLowPpm, input.allowanceHighPpm];
  return {
    animation: false,
    textStyle: base.textStyle,
    aria: { enabled: false },
    grid: { left: 8, right: 8, top: 8, bottom: 26 },
    tooltip: {
      ...base.tooltip,
      trigger: 'item' as const,
      formatter: ({ dataIndex }: { dataIndex: number }) => tip(bins[dataIndex]!),
    },
    xAxis: {
      type: 'value' as const,
      min: lowPpm,
      max: highPpm,
      ...base.axis,
      splitLine: { show: false },
      axisLabel: {
        ...base.axis.axisLabel,
        hideOverlap: true,
        showMinLabel: false,
        showMaxLabel: false,
        formatter: (value: number) => signed(value),
      },
    },
    yAxis: { type: 'value' as const, min: 0, max: top * 1.06, show: false },
    dataZoom: [
      {
        type: 'inside' as const,
        xAxisIndex: 0,
        filterMode: 'none' as const,
        zoomOnMouseWheel: 'ctrl' as const,
        moveOnMouseMove: true,
      },
    ],
    series: [
      {
        type: 'custom' as const,
        name: 'units',
        clip: true,
        renderItem: (_: CustomSeriesRenderItemParams, chart: CustomSeriesRenderItemAPI) =>
          renderBin(chart, input, colours),
        encode: { x: [0, 1], y: 2 },
        data: bins.map((bin) => [bin.fromPpm, bin.toPpm, perBin(bin, typicalWidth)]),
        markArea: {
          silent: true,
          data: guardAreas(input),
          itemStyle: { color: colours.trough, opacity: 0.8 },
          z: 0,
        },
        markLine: {
          silent: true,
          symbol: 'none',
          animation: false,
          label: { show: false },
          lineStyle: { color: colours.ink, width: 2, type: 'solid' as const },
          data: limits.map((xAxis) => ({ xAxis })),
        },
      },
      {
        type: 'line' as const,
        name: 'normal',
        silent: true,
        symbol: 'none',
        tooltip: { show: false },
        lineStyle: { color: colours.amethyst, width: 1.5 },
        data: curve,
        z: 3,
      },
      {
        type: 'custom' as const,
        name: 'allowance',
        silent: true,
        clip: true,
        tooltip: { show: false },
        renderItem: (_: CustomSeriesRenderItemParams, chart: CustomSeriesRenderItemAPI) =>
          renderBracket(chart, top * 1.04, colours),
        encode: { x: 0 },
        data: allowance.flatMap((ppm, index) =>
          ppm === null ? [] : [[ppm, index === 0 ? 1 : -1]],
        ),
        z: 4,
      },
    ],
  };
}

/** Unequal bins are drawn by density, scaled to the typical bin, so that areas compare. */
function perBin(bin: HistogramBin, typicalWidth: number): number {
  return (bin.units * typicalWidth) / (bin.toPpm - bin.fromPpm);
}

function medianWidth(bins: readonly HistogramBin[]): number {
  const widths = bins.map((bin) => bin.toPpm - bin.fromPpm).sort((a, b) => a - b);
  return widths[Math.floor(widths.length / 2)] ?? 1;
}

function curvePoints(
  input: BandStripInput,
  lowPpm: number,
  highPpm: number,
  widthPpm: number,
): [number, number][] {
  const points: [number, number][] = [];
  const from = Math.max(lowPpm, (input.meanPpm ?? 0) - 5 * (input.sdPpm ?? 0));
  const to = Math.min(highPpm, (input.meanPpm ?? 0) + 5 * (input.sdPpm ?? 0));
  for (let step = 0; step <= 160; step += 1) {
    const ppm = from + (step * (to - from)) / 160;
    const units = normalUnits(input, ppm, widthPpm);
    if (units !== null) points.push([ppm, units]);
  }
  return points;
}

function guardAreas({ lowLimitPpm, highLimitPpm, guardBandPpm }: BandStripInput) {
  if (!(guardBandPpm > 0)) return [];
  const areas: [{ xAxis: number }, { xAxis: number }][] = [];
  if (lowLimitPpm !== null)
    areas.push([{ xAxis: lowLimitPpm }, { xAxis: lowLimitPpm + guardBandPpm }]);
  if (highLimitPpm !== null)
    areas.push([{ xAxis: highLimitPpm - guardBandPpm }, { xAxis: highLimitPpm }]);
  return areas;
}

/** A bin across a limit is painted in two colours, cut at the limit. A bin with one unit stays visible. */
function renderBin(chart: CustomSeriesRenderItemAPI, input: BandStripInput, colours: ChartColours) {
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

function renderBracket(chart: CustomSeriesRenderItemAPI, top: number, colours: ChartColours) {
  const [x = 0, y = 0] = chart.coord([Number(chart.value(0)), top]);
  const floor = chart.coord([0, 0])[1]!;
  const lip = 5 * Number(chart.value(1));
  return {
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
  };
}

export function binTip(bin: HistogramBin): { from: string; to: string; count: string } {
  return { from: signed(bin.fromPpm), to: signed(bin.toPpm), count: count(bin.units) };
}

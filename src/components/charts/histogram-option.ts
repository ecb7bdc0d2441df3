import { type CustomSeriesRenderItemAPI, type CustomSeriesRenderItemParams } from 'echarts';
import { formatNumber } from '@shared/format/number';
import { type BandStripInput } from '@shared/band-strip/types';
import {
  curvePoints,
  histogramBins,
  histogramRange,
  medianWidthPpm,
  unitsPerBin,
  type HistogramBin,
} from './histogram-bins';
import { renderBin, renderBracket, renderGuard, renderPost } from './histogram-items';
import { baseOption, type ChartColours } from './useChartTheme';

type Draw = (chart: CustomSeriesRenderItemAPI, top: number, colours: ChartColours) => object;

export interface HistogramTexts {
  tip(bin: HistogramBin): string;
}

/** The histogram as an ECharts option. The bins are series 0, so that rows and points match one to one. */
export function histogramOption(
  input: BandStripInput,
  colours: ChartColours,
  isStill: boolean,
  texts: HistogramTexts,
) {
  const base = baseOption(colours, isStill);
  const bins = histogramBins(input);
  const { lowPpm, highPpm } = histogramRange(input);
  const widthPpm = medianWidthPpm(bins);
  const curve = curvePoints(input, widthPpm);
  const top =
    1.08 *
    Math.max(
      1,
      ...bins.map((bin) => unitsPerBin(bin, widthPpm)),
      ...curve.map(([, units]) => units),
    );
  const mark = (name: string, data: number[][], draw: Draw, z: number) => ({
    type: 'custom' as const,
    name,
    data,
    z,
    silent: true,
    clip: false,
    encode: { x: 0 },
    tooltip: { show: false },
    renderItem: (params: CustomSeriesRenderItemParams, chart: CustomSeriesRenderItemAPI) =>
      isInside(params, chart)
        ? draw(chart, top, colours)
        : { type: 'group' as const, children: [] },
  });
  return {
    animation: false,
    textStyle: base.textStyle,
    aria: { enabled: false },
    grid: { left: 4, right: 4, top: 26, bottom: 28, outerBoundsMode: 'none' as const },
    tooltip: {
      ...base.tooltip,
      trigger: 'item' as const,
      formatter: ({ dataIndex }: { dataIndex: number }) => texts.tip(bins[dataIndex]!),
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
        formatter: (value: number) => formatNumber(value, { sign: 'always' }),
      },
    },
    yAxis: { type: 'value' as const, min: 0, max: top, show: false },
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
        z: 3,
        encode: { x: [0, 1], y: 2 },
        data: bins.map((bin) => [bin.fromPpm, bin.toPpm, unitsPerBin(bin, widthPpm)]),
        renderItem: (_: CustomSeriesRenderItemParams, chart: CustomSeriesRenderItemAPI) =>
          renderBin(chart, input, colours),
      },
      mark('guard bands', guards(input), renderGuard, 2),
      mark('limits', pairs(input.lowLimitPpm, input.highLimitPpm), renderPost, 5),
      mark('allowance', pairs(input.allowanceLowPpm, input.allowanceHighPpm), renderBracket, 5),
      {
        type: 'line' as const,
        name: 'normal',
        silent: true,
        symbol: 'none',
        tooltip: { show: false },
        lineStyle: { color: colours.amethyst, width: 1.5 },
        data: curve,
        z: 4,
      },
    ],
  };
}

/** Each end with the direction in which its bracket opens. */
function pairs(lowPpm: number | null, highPpm: number | null): number[][] {
  return [[lowPpm, 1] as const, [highPpm, -1] as const].flatMap(([ppm, inward]) =>
    ppm === null ? [] : [[ppm, inward]],
  );
}

function guards({ lowLimitPpm, highLimitPpm, guardBandPpm }: BandStripInput): number[][] {
  if (!(guardBandPpm > 0)) return [];
  const bands: number[][] = [];
  if (lowLimitPpm !== null) bands.push([lowLimitPpm, lowLimitPpm + guardBandPpm]);
  if (highLimitPpm !== null) bands.push([highLimitPpm - guardBandPpm, highLimitPpm]);
  return bands;
}

/** Marks reach above the plot for their values, so they are not clipped; what zooming moves outside is left out here. */
function isInside(
  { coordSys }: CustomSeriesRenderItemParams,
  chart: CustomSeriesRenderItemAPI,
): boolean {
  const { x, width } = coordSys as unknown as { x: number; width: number };
  const at = chart.coord([Number(chart.value(0)), 0])[0]!;
  return at >= x - 1 && at <= x + width + 1;
}

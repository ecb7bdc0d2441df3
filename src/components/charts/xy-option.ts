import { formatNumber } from '@shared/format/number';
import { baseOption, type ChartColours } from './useChartTheme';

export interface XyAxis {
  name: string;
  format?: (value: number) => string;
  min?: number;
  max?: number;
  type?: 'value' | 'log';
  isInverse?: boolean;
}

export interface XyChart {
  x: XyAxis;
  y: XyAxis;
  /** What pointing at a point of the first series says. */
  tip: (index: number) => string;
  series: readonly object[];
  zooms?: boolean;
}

/** Axes, grid, zoom and tooltip of a plain chart of y against x, as an ECharts option. */
export function xyOption(
  colours: ChartColours,
  isStill: boolean,
  { x, y, tip, series, zooms }: XyChart,
) {
  const base = baseOption(colours, isStill);
  const axis = ({ name, format, min, max, type = 'value', isInverse }: XyAxis) => ({
    type,
    name,
    min,
    max,
    inverse: isInverse,
    scale: true,
    ...base.axis,
    axisLine: { ...base.axis.axisLine, onZero: false },
    splitLine: { show: false },
    axisLabel: {
      ...base.axis.axisLabel,
      hideOverlap: true,
      // The ends of an axis that was cut to its data are seldom round.
      showMinLabel: min === undefined || Number.isInteger(min),
      showMaxLabel: max === undefined || Number.isInteger(max),
      formatter: format ?? ((value: number) => formatNumber(value, { significant: 6 })),
    },
  });
  return {
    animation: false,
    textStyle: base.textStyle,
    aria: { enabled: false },
    grid: { left: 56, right: 20, top: 32, bottom: 46, outerBoundsMode: 'none' as const },
    tooltip: {
      ...base.tooltip,
      trigger: 'axis' as const,
      axisPointer: { type: 'line' as const, lineStyle: { color: colours.edge } },
      formatter: (points: readonly { dataIndex: number; seriesIndex: number }[]) => {
        const first = points.find(({ seriesIndex }) => seriesIndex === 0);
        return first ? tip(first.dataIndex) : '';
      },
    },
    xAxis: { ...axis(x), nameLocation: 'middle' as const, nameGap: 28 },
    yAxis: {
      ...axis(y),
      nameLocation: y.isInverse ? ('start' as const) : ('end' as const),
      nameGap: 12,
      nameTextStyle: {
        ...base.axis.nameTextStyle,
        align: 'left' as const,
        padding: [0, 0, 0, -50],
      },
      splitLine: { show: true, lineStyle: { color: colours.line } },
    },
    ...(zooms && {
      dataZoom: [
        {
          type: 'inside' as const,
          xAxisIndex: 0,
          filterMode: 'none' as const,
          zoomOnMouseWheel: 'ctrl' as const,
          moveOnMouseMove: true,
        },
      ],
    }),
    series,
  };
}

/** A line without symbols that nothing points at. */
export function plainLine(
  name: string,
  data: readonly (readonly [number, number | null])[],
  color: string,
  more: object = {},
) {
  return {
    type: 'line' as const,
    name,
    data,
    symbol: 'none',
    silent: true,
    lineStyle: { color, width: 1.5 },
    itemStyle: { color },
    ...more,
  };
}

/** A line one can walk along, point by point; the points show themselves only when pointed at. */
export function readableLine(
  name: string,
  data: readonly (readonly [number, number | null])[],
  color: string,
  more: object = {},
) {
  return {
    ...plainLine(name, data, color),
    symbol: 'circle',
    symbolSize: 7,
    showSymbol: false,
    silent: false,
    ...more,
  };
}

export interface Mark {
  at: number;
  text: string;
  color: string;
  isDashed?: boolean;
  position?: 'start' | 'end';
}

/** Straight lines across the chart with a word at their end: limits, boundaries, the lot's own value. */
export function markLines(axis: 'xAxis' | 'yAxis', marks: readonly Mark[]) {
  return {
    silent: true,
    symbol: 'none',
    animation: false,
    data: marks.map(({ at, text, color, isDashed, position }) => ({
      [axis]: at,
      lineStyle: { color, width: 1.25, type: isDashed ? ('dashed' as const) : ('solid' as const) },
      label: {
        formatter: text,
        color,
        fontSize: 12.5,
        position: position ?? ('end' as const),
        distance: axis === 'xAxis' ? 4 : 6,
      },
    })),
  };
}

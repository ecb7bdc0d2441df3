import { onMounted, shallowRef, watch } from 'vue';
import { useMediaQuery } from '@vueuse/core';
import { usePreferences } from '@/stores/preferences';

const names = [
  'paper',
  'sheet',
  'veil',
  'trough',
  'ink',
  'soft',
  'line',
  'edge',
  'amethyst',
  'citrine',
  'rose',
  'prase',
  'bars',
  'hatch',
] as const;

export type ChartColours = Record<(typeof names)[number], string>;

export const chartFont = "'Source Sans 3', 'Segoe UI', Arial, sans-serif";

/** Our tokens as plain values for charts, which cannot read CSS variables; follows the theme as it changes. */
export function useChartTheme() {
  const preferences = usePreferences();
  const isDark = useMediaQuery('(prefers-color-scheme: dark)');
  const isStill = useMediaQuery('(prefers-reduced-motion: reduce)');
  const colours = shallowRef(read());
  watch([() => preferences.theme, isDark], () => (colours.value = read()), { flush: 'post' });
  // A canvas drawn before the typeface arrived keeps the fallback's letters until it is drawn again.
  onMounted(
    () => void document.fonts.load(`13px ${chartFont}`).then(() => (colours.value = read())),
  );
  return { colours, isStill };
}

function read(): ChartColours {
  const style = getComputedStyle(document.documentElement);
  return Object.fromEntries(
    names.map((name) => [name, style.getPropertyValue(`--${name}`).trim()]),
  ) as ChartColours;
}

/** Text, axes and tooltip of every chart. The tooltip is painted, since markup with inline styles is refused by our CSP. */
export function baseOption(colours: ChartColours, isStill: boolean) {
  const label = { margin: 9, color: colours.soft, fontFamily: chartFont, fontSize: 12.5 };
  return {
    animation: !isStill,
    animationDuration: 120,
    animationDurationUpdate: 120,
    textStyle: { fontFamily: chartFont, color: colours.ink, fontSize: 13 },
    tooltip: {
      renderMode: 'richText' as const,
      confine: true,
      transitionDuration: 0,
      backgroundColor: colours.ink,
      borderWidth: 0,
      borderRadius: 3,
      padding: [4, 8],
      shadowBlur: 0,
      textStyle: { color: colours.paper, fontFamily: chartFont, fontSize: 13 },
    },
    axis: {
      axisLine: { lineStyle: { color: colours.edge, width: 1 } },
      axisTick: { lineStyle: { color: colours.edge } },
      axisLabel: label,
      nameTextStyle: label,
      splitLine: { lineStyle: { color: colours.line } },
    },
  };
}

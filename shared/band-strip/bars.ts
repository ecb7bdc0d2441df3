import { type Frame } from './frame';
import { type Scale } from './scale';
import { type BandStripGeometry, type BandStripInput } from './types';

/**
 * The body of the lot as bars. Neighbouring bins are joined until a bar is wide enough to see; the height is units per
 * ppm, so joined and unequal bins stay comparable. A bin beyond a limit is left out, since its units are drawn one by
 * one, and a bin that straddles a limit stops there. A bin with even one unit is at least a pixel high.
 */
export function layoutBars(
  input: BandStripInput,
  scale: Scale,
  frame: Frame,
): BandStripGeometry['bars'] {
  const { edgesPpm, counts } = input.histogram;
  const lowPpm = Math.max(scale.lowPpm, input.lowLimitPpm ?? -Infinity);
  const highPpm = Math.min(scale.highPpm, input.highLimitPpm ?? Infinity);
  const joined: { fromPpm: number; toPpm: number; count: number; perPpm: number }[] = [];
  let index = 0;
  while (index < counts.length) {
    let from = edgesPpm[index]!;
    let to = edgesPpm[index + 1]!;
    let count = counts[index]!;
    index += 1;
    if (to <= lowPpm || from >= highPpm) continue;
    while (
      index < counts.length &&
      scale.xOf(to) - scale.xOf(from) < frame.minBar &&
      edgesPpm[index]! < highPpm
    ) {
      count += counts[index]!;
      to = edgesPpm[index + 1]!;
      index += 1;
    }
    const perPpm = count / (to - from);
    from = Math.max(from, lowPpm);
    to = Math.min(to, highPpm);
    if (count > 0 && to > from) joined.push({ fromPpm: from, toPpm: to, count, perPpm });
  }
  let highest = 0;
  for (const bin of joined) highest = Math.max(highest, bin.perPpm);
  return joined.map((bin) => {
    const x = scale.xOf(bin.fromPpm);
    const width = Math.max(1, scale.xOf(bin.toPpm) - x - 1);
    const height = Math.max(1.5, (bin.perPpm / highest) * (frame.axisY - frame.barTop));
    return { x: x + 0.5, y: frame.axisY - height, width, height, count: bin.count };
  });
}

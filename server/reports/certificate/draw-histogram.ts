import { formatNumber } from '@shared/format/number';
import { count } from '@shared/format/counts';
import { type AnalysisResult } from '@shared/contract/analysis';
import { inks, type Sheet } from './sheet';

const height = 104;

/** Units by offset, with the limits as posts: the bins of the frozen analysis, drawn to the same axis in ppm. */
export function drawHistogram(sheet: Sheet, { histogram, limits, offset }: AnalysisResult): void {
  const { edgesPpm, counts } = histogram;
  if (counts.length === 0) return;
  sheet.need(height + 34);
  const { doc } = sheet;
  const posts = [limits.lowPpm, limits.highPpm].filter((ppm) => ppm !== null);
  const low = Math.min(edgesPpm[0]!, ...posts);
  const high = Math.max(edgesPpm.at(-1)!, ...posts);
  const pad = (high - low || 1) * 0.04;
  const plot = { left: sheet.left + 34, width: sheet.width - 44, top: sheet.y + 12 };
  const base = plot.top + height;
  const x = (ppm: number) =>
    plot.left + ((ppm - low + pad) / (high - low + 2 * pad || 1)) * plot.width;
  const most = Math.max(...counts);
  const steps = ticks(0, most, 4).filter(Number.isInteger);
  const top = Math.max(most, steps.at(-1) ?? most);
  const y = (units: number) => base - (units / top) * (height - 8);

  sheet.line('units', plot.top - 10, {
    size: 7.5,
    ink: 'soft',
    x: sheet.left,
    width: 28,
    align: 'right',
  });
  for (const units of steps) {
    if (units > 0)
      doc
        .moveTo(plot.left, y(units))
        .lineTo(plot.left + plot.width, y(units))
        .lineWidth(0.4)
        .stroke(inks.line);
    sheet.line(count(units), y(units) - 4.5, {
      size: 7.5,
      ink: 'soft',
      x: sheet.left,
      width: 28,
      align: 'right',
    });
  }
  counts.forEach((units, index) => {
    if (units === 0) return;
    const from = x(edgesPpm[index]!);
    const to = x(edgesPpm[index + 1]!);
    doc.rect(from, y(units), Math.max(0.6, to - from - 0.5), base - y(units)).fill(inks.bars);
  });
  doc
    .moveTo(plot.left, base)
    .lineTo(plot.left + plot.width, base)
    .lineWidth(0.75)
    .stroke(inks.soft);
  for (const ppm of ticks(low, high, 8)) {
    doc
      .moveTo(x(ppm), base)
      .lineTo(x(ppm), base + 3)
      .lineWidth(0.5)
      .stroke(inks.soft);
    sheet.lineCentred(formatNumber(ppm, { significant: 4, sign: 'always' }), x(ppm), base + 4, {
      size: 7.5,
      ink: 'soft',
    });
  }
  for (const ppm of posts)
    doc.moveTo(x(ppm), plot.top).lineTo(x(ppm), base).lineWidth(1.5).stroke(inks.ink);
  if (posts.length > 0)
    sheet.lineCentred('limit', x(posts.at(-1)!), plot.top - 10, { size: 7.5, ink: 'soft' });
  if (posts.length > 1)
    sheet.lineCentred('limit', x(posts[0]!), plot.top - 10, { size: 7.5, ink: 'soft' });
  const mean = x(offset.meanPpm);
  doc
    .moveTo(mean, base + 1)
    .lineTo(mean + 3.5, base + 6)
    .lineTo(mean - 3.5, base + 6)
    .closePath()
    .fill(inks.ink);
  sheet.space(12 + height + 15);
  sheet.line('offset at the reference temperature, ppm', sheet.y, {
    size: 7.5,
    ink: 'soft',
    x: plot.left,
    width: plot.width,
    align: 'right',
  });
  sheet.space(12);
}

/** Round values from low to high, about `wanted` of them. */
function ticks(low: number, high: number, wanted: number): number[] {
  const rough = (high - low) / wanted || 1;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].find((factor) => factor * power >= rough)! * power;
  const first = Math.ceil(low / step - 1e-9);
  const last = Math.floor(high / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, i) =>
    Number(((first + i) * step).toPrecision(12)),
  );
}

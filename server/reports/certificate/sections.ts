import { type Decision } from '@shared/contract/dispositions';
import { count, countOf } from '@shared/format/counts';
import { date, dateTime } from '@shared/format/dates';
import { hertz, reading } from '@shared/format/hertz';
import { formatNumber } from '@shared/format/number';
import { percent } from '@shared/format/percent';
import { limitsPpm, ppm } from '@shared/format/ppm';
import { expandedUncertainty } from '@shared/format/uncertainty';
import { type CertificateContent } from './content';
import { drawBandStrip } from './draw-strip';
import { drawHistogram } from './draw-histogram';
import { facts, heading, table } from './pieces';
import { inks, type Ink, type Sheet } from './sheet';

const decisionWords: Record<Decision, { text: string; ink: Ink }> = {
  accept: { text: 'Accepted', ink: 'prase' },
  accept_under_concession: { text: 'Accepted under concession', ink: 'prase' },
  hold: { text: 'On hold', ink: 'rose' },
  reject: { text: 'Rejected', ink: 'rose' },
  inspect_all: { text: '100 % inspection ordered', ink: 'citrine' },
};
const treatmentWords = {
  return_to_supplier: 'The units go back to the supplier.',
  scrap: 'The units are scrapped.',
} as const;

export function writeHead(sheet: Sheet, { signed, decisionNumber }: CertificateContent): void {
  sheet.drawMark(sheet.left - 3, sheet.y, 28);
  sheet.line('Lot certificate', sheet.y, { size: 19, weight: 600, x: sheet.left + 32 });
  sheet.line('Quartzhold', sheet.y + 8, { size: 9.5, ink: 'soft', align: 'right' });
  sheet.space(34);
  sheet.rule();
  sheet.space(8);
  sheet.paragraph(`Lot ${signed.lot.lotNumber}, decision ${decisionNumber}`, {
    size: 13,
    weight: 600,
  });
  sheet.space(4);
}

export function writeIdentity(sheet: Sheet, content: CertificateContent): void {
  const { signed, result, criteria } = content;
  facts(sheet, [
    ['Part', `${criteria.part.partNumber}${signed.deviceKind ? `, ${signed.deviceKind}` : ''}`],
    ['Nominal frequency', reading(result.nominalFrequencyHz)],
    ['Supplier', signed.supplierName ?? null],
    ['Date code', signed.lot.dateCode],
    ['Purchase order', signed.lot.purchaseOrder],
    ['Lot size', countOf(signed.lot.lotSize, 'unit')],
    ['Received', date(signed.lot.receivedOn)],
  ]);
}

export function writeDecision(sheet: Sheet, { signed, result }: CertificateContent): void {
  const { text, ink } = decisionWords[signed.decision];
  sheet.space(10);
  sheet.need(60);
  const top = sheet.y;
  sheet.doc.rect(sheet.left, top + 1, 4, 17).fill(inks[ink]);
  sheet.line(text, top, { size: 14, weight: 600, ink, x: sheet.left + 12 });
  sheet.space(23);
  const { concession } = signed;
  facts(sheet, [
    ['Reason', signed.reason],
    ['Treatment', signed.treatment && treatmentWords[signed.treatment]],
    ['Nonconformity', concession?.nonconformity ?? null],
    [
      'Limited to',
      concession &&
        [
          concession.greatestQuantity === null ? '' : countOf(concession.greatestQuantity, 'unit'),
          concession.until === null ? '' : `until ${date(concession.until)}`,
        ]
          .filter(Boolean)
          .join(', '),
    ],
    ['Customer approval', concession?.customerReference ?? null],
    ['Correction', signed.correction],
  ]);
  heading(sheet, 'Finding');
  sheet.paragraph(result.finding.headline, { weight: 600 });
  sheet.space(2);
  const signs = { against: '\u2212', for: '+', note: '\u00b7' } as const;
  for (const reason of result.finding.reasons) {
    const style = { x: sheet.left + 14, width: sheet.width - 14 };
    sheet.need(sheet.heightOf(reason.text, style));
    sheet.line(signs[reason.weight], sheet.y, {
      weight: 600,
      x: sheet.left + 3,
      ink: reason.weight === 'against' ? 'rose' : 'soft',
    });
    sheet.paragraph(reason.text, style);
    sheet.space(1.5);
  }
}

export function writeCriteria(sheet: Sheet, { criteria, result }: CertificateContent): void {
  const { part, bench } = criteria;
  heading(sheet, 'Criteria in force');
  facts(sheet, [
    [
      'Part revision',
      `${part.revision}${part.effectiveFrom ? `, in force from ${date(part.effectiveFrom)}` : ''}`,
    ],
    [
      'Limits',
      `${limitsPpm(result.limits)} at ${formatNumber(result.referenceTemperatureC)}\u00a0°C`,
    ],
    ['Sampling', `${result.sampling.text}; ${criteria.severity} inspection`],
    ['Source of the plan', result.sampling.source],
    ['Decision rule', result.guardBand.text],
    [
      'Bench',
      bench
        ? `${bench.name}, expanded uncertainty ${expandedUncertainty(bench.expandedUncertaintyPpm, 'ppm')} (k = ${formatNumber(bench.coverageFactor)}), ${bench.inCalibration ? 'in calibration' : 'out of calibration'}`
        : 'not named',
    ],
    [
      'Receivers',
      criteria.receivers.map((r) => `${r.name} revision ${r.revision}`).join(', ') || 'none',
    ],
  ]);
}

export function writePictures(sheet: Sheet, { result }: CertificateContent): void {
  heading(sheet, 'Units against limits and receiver allowance', 90);
  drawBandStrip(sheet, result.bandStrip);
  heading(sheet, 'Distribution', 150);
  drawHistogram(sheet, result);
}

export function writeNumbers(sheet: Sheet, { result }: CertificateContent): void {
  const { offset, beyond, capability, tolerance, guardBand, risk } = result;
  const share = ({ count: units, share: part, upperBound }: typeof beyond.limits) =>
    `${countOf(units, 'unit')}, ${percent(part)}; at most ${percent(upperBound)} of the lot with 95\u00a0% confidence`;
  const maybe = (value: number | null, text: (value: number) => string) =>
    value === null ? null : text(value);
  heading(sheet, 'Numbers');
  facts(sheet, [
    [
      'Measured',
      `${countOf(result.units, 'unit')} of ${count(result.unitsPlanned)} planned, ${countOf(result.readings, 'reading')}`,
    ],
    ['Mean offset', ppm(offset.meanPpm, { sign: 'always', significant: 4 })],
    [
      'Uncertainty of mean',
      maybe(result.uncertaintyOfMeanPpm, (u) => `${expandedUncertainty(u, 'ppm')} (expanded)`),
    ],
    ['Standard deviation', ppm(offset.sdPpm, { significant: 4 })],
    [
      'Lowest, median, highest',
      [offset.minPpm, offset.medianPpm, offset.maxPpm]
        .map((value) => ppm(value, { sign: 'always', significant: 4 }))
        .join(', '),
    ],
    ['Beyond limits', share(beyond.limits)],
    ['Beyond allowance', beyond.allowance && share(beyond.allowance)],
    [
      'By the decision rule',
      `${countOf(guardBand.conforming, 'unit')} conforming, ${count(guardBand.notProven)} not proven, ${count(guardBand.nonconforming)} nonconforming`,
    ],
    [
      'Tolerance interval',
      tolerance &&
        `${ppm(tolerance.lowPpm, { sign: 'always', significant: 4 })} to ${ppm(tolerance.highPpm, { sign: 'always', significant: 4 })} holds ${percent(tolerance.coverage)} of the lot with ${percent(tolerance.confidence)} confidence`,
    ],
    [
      'Performance',
      maybe(
        capability.ppk,
        (ppk) =>
          `Ppk ${formatNumber(ppk, { significant: 3 })}${capability.pp === null ? '' : `, Pp ${formatNumber(capability.pp, { significant: 3 })}`}${capability.ppkLowerBound === null ? '' : `; Ppk at least ${formatNumber(capability.ppkLowerBound, { significant: 3 })} with 95\u00a0% confidence`}`,
      ),
    ],
    [
      'Outliers',
      result.outliers.count === 0
        ? null
        : `${count(result.outliers.count)} (${result.outliers.method})`,
    ],
    [
      'Wrong decisions, global',
      risk.consumersGlobal === null
        ? null
        : `consumer ${percent(risk.consumersGlobal)}, producer ${percent(risk.producersGlobal)}`,
    ],
  ]);
  sheet.space(4);
  sheet.need(60);
  table(
    sheet,
    [
      { head: 'Share of the lot beyond the limits', share: 34 },
      { head: 'estimate', share: 14, align: 'right' },
      { head: 'upper bound, 95\u00a0%', share: 18, align: 'right' },
      { head: 'may it be trusted?', share: 44 },
    ],
    result.shareBeyond.map((method) => [
      method.label,
      method.estimate === null ? '–' : percent(method.estimate),
      method.upperBound === null ? '–' : percent(method.upperBound),
      method.trust,
    ]),
  );
}

export function writeLinks(sheet: Sheet, { result }: CertificateContent): void {
  if (result.links.length === 0) return;
  heading(sheet, 'Links made with these units', 60);
  table(
    sheet,
    [
      { head: 'Receiver', share: 26 },
      { head: 'allowance', share: 20, align: 'right' },
      { head: 'for our unit', share: 15, align: 'right' },
      { head: 'beyond symbol-rate region', share: 21, align: 'right' },
      { head: 'outside front end', share: 19, align: 'right' },
      { head: 'allowed', share: 14, align: 'right' },
    ],
    result.links.map((link) => [
      `${link.receiverName}${link.strictest && result.links.length > 1 ? ' (strictest)' : ''}`,
      `±${hertz(link.allowance.totalHz)}, ±${ppm(link.allowance.totalPpm)}`,
      `±${ppm(link.allowance.forUnitPpm)}`,
      `${percent(link.beyondSymbolRate.share)}, at most ${percent(link.beyondSymbolRate.upperBound)}`,
      `${percent(link.outsideFrontEnd.share)}, at most ${percent(link.outsideFrontEnd.upperBound)}`,
      `${percent(link.allowedShareBeyond)}, ${link.withinAllowed ? 'kept' : 'not kept'}`,
    ]),
  );
  const losses = result.links
    .filter((link) => link.symbolRate.lossDb !== null)
    .map(
      (link) =>
        `${link.receiverName}: ${percent(link.symbolRate.share)} of links work at one sample a symbol and lose at most ${formatNumber(link.symbolRate.lossDb, { significant: 2 })}\u00a0dB in the matched filter.`,
    );
  for (const loss of losses) sheet.paragraph(loss, { size: 8.5, ink: 'soft' });
}

export function writeTemperatureAndTime(sheet: Sheet, { result }: CertificateContent): void {
  const { temperature, time } = result;
  if (!temperature && !time) return;
  heading(sheet, 'Temperature and time');
  facts(sheet, [
    [
      'Temperature',
      temperature &&
        `${countOf(temperature.unitsCount, 'unit')} at ${temperature.temperaturesC.map((t) => formatNumber(t)).join(', ')}\u00a0°C; ${count(temperature.stability.unitsBeyond)} beyond ${temperature.stability.limitPpm === null ? 'the limit, none being set' : `±${ppm(temperature.stability.limitPpm)}`}`,
    ],
    ...(temperature?.notes.map((note) => ['', note] as const) ?? []),
    ['Ageing', time && time.ageing.note],
  ]);
}

const roleWords: Record<string, string> = { quality_engineer: 'quality engineer' };

export function writeSignatures(sheet: Sheet, { signatures }: CertificateContent): void {
  heading(sheet, signatures.length === 1 ? 'Signature' : 'Signatures', 90);
  for (const signature of signatures) {
    sheet.need(86);
    sheet.paragraph(
      `${signature.printedName}, ${roleWords[signature.role] ?? signature.role.replaceAll('_', ' ')}`,
      { weight: 600, size: 10.5 },
    );
    facts(sheet, [
      ['Meaning', signature.meaning],
      ['Reason', signature.reason],
      [
        'Signed',
        `${dateTime(signature.signedAt, 'UTC', { seconds: true })} (${signature.signedAt.toISOString()}; the server's zone is ${signature.zone})`,
      ],
      ['Content, SHA-256', signature.contentHash],
    ]);
    sheet.space(5);
  }
}

export function writeHashes(sheet: Sheet, content: CertificateContent): void {
  heading(sheet, 'What this rests on', 60);
  facts(sheet, [
    [
      'Analysis',
      `version ${content.analysisVersion}, made by method ${content.methodVersion}, frozen by the signature`,
    ],
    ['Readings, SHA-256', content.hashes.input],
    ['Criteria, SHA-256', content.hashes.criteria],
    ['Result, SHA-256', content.hashes.result],
  ]);
  sheet.space(4);
  sheet.paragraph(
    'This certificate states what was signed. Whether the decision still counts is shown by the product: new readings or a later decision may have overtaken it.',
    { size: 8.5, ink: 'soft' },
  );
}

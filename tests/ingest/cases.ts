import { gzipSync } from 'node:zlib';

/** A file and what becomes of it: rows taken and the rules of the refused ones in file order, or the failure of the whole. */
export interface CorpusCase {
  name: string;
  bytes: Buffer;
  taken?: string[];
  /** `line:rule` */
  refused?: string[];
  fails?: string;
  mapping?: object;
}

const head = 'serial,temperature_c,frequency_hz,measured_at';
const row = (serial: string, hz = '16000001.5') => `${serial},25,${hz},`;
const text = (...lines: string[]) => Buffer.from(lines.join('\n'), 'utf8');
const lines = (end: string, ...all: string[]) =>
  Buffer.from(all.map((l) => l + end).join(''), 'utf8');
const repeat = (what: string, count: number) => what.repeat(count);

const semicolon = {
  delimiter: ';',
  decimalSign: ',',
  columns: [{ target: 'serial' }, { target: 'frequency', unit: 'Hz' }],
};
const onlyFrequency = (unit: string) => ({
  columns: [{ target: 'serial' }, { target: 'frequency', unit }],
});
const plainIn = (encoding: string) => ({
  encoding,
  columns: [
    { target: 'serial' },
    { target: 'temperature' },
    { target: 'frequency', unit: 'Hz' },
    { target: 'measuredAt' },
  ],
});

/** More than sixty files: what honest benches write, what spreadsheets make of it, and what somebody sends to do harm. */
export function corpusCases(): CorpusCase[] {
  return [
    { name: 'plain', bytes: text(head, row('A'), row('B'), ''), taken: ['A', 'B'] },
    { name: 'no-last-line-end', bytes: text(head, row('A'), row('B')), taken: ['A', 'B'] },
    { name: 'crlf', bytes: lines('\r\n', head, row('A'), row('B')), taken: ['A', 'B'] },
    { name: 'cr', bytes: lines('\r', head, row('A'), row('B')), taken: ['A', 'B'] },
    {
      name: 'mixed-line-ends',
      bytes: Buffer.from(`${head}\r\n${row('A')}\n${row('B')}\r${row('C')}\r\n`),
      taken: ['A', 'B', 'C'],
    },
    {
      name: 'mixed-line-numbers',
      bytes: Buffer.from(`${head}\r\n${row('A')}\r\r\n\n${row('B', 'x')}\r\n`),
      taken: ['A'],
      refused: ['5:number.unreadable'],
    },
    { name: 'bom', bytes: Buffer.from(`\ufeff${head}\n${row('A')}\n`), taken: ['A'] },
    { name: 'bom-crlf', bytes: Buffer.from(`\ufeff${head}\r\n${row('Ä')}\r\n`), taken: ['Ä'] },
    {
      name: 'blank-lines',
      bytes: text('', head, '', row('A'), '   ', ',,,', row('B'), '', ''),
      taken: ['A', 'B'],
    },
    { name: 'header-only', bytes: text(head, ''), fails: 'file.no_rows' },
    { name: 'blank-only', bytes: text('', '', ''), fails: 'file.no_rows' },
    {
      name: 'umlauts',
      bytes: text(head, row('Prüfling-µ'), row('漢字'), row('😀')),
      taken: ['Prüfling-µ', '漢字', '😀'],
    },
    {
      name: 'combining',
      bytes: text(head, row('e\u0301'), row('\u00e9')),
      taken: ['e\u0301', '\u00e9'],
    },
    {
      name: 'utf16le',
      bytes: Buffer.from(`\ufeff${head}\n${row('Ä😀')}\n`, 'utf16le'),
      taken: ['Ä😀'],
    },
    {
      name: 'utf16be',
      bytes: Buffer.from(`\ufeff${head}\n${row('Ä😀')}\n`, 'utf16le').swap16(),
      taken: ['Ä😀'],
    },
    {
      name: 'utf16le-declared',
      bytes: Buffer.from(`${head}\n${row('Ä')}\n`, 'utf16le'),
      mapping: plainIn('utf-16le'),
      taken: ['Ä'],
    },
    {
      name: 'utf16-odd',
      bytes: Buffer.concat([
        Buffer.from(`\ufeff${head}\n${row('A')}\n`, 'utf16le'),
        Buffer.from([65]),
      ]),
      fails: 'file.encoding',
    },
    {
      name: 'windows-1252',
      bytes: Buffer.from(`${head}\n${row('Prüf\u0080')}\n`, 'latin1'),
      mapping: plainIn('windows-1252'),
      taken: ['Prüf€'],
    },
    {
      name: 'windows-1252-undeclared',
      bytes: Buffer.from(`${head}\n${row('Prüf')}\n`, 'latin1'),
      fails: 'file.encoding',
    },
    {
      name: 'cut-utf8',
      bytes: Buffer.from(`${head}\n${row('A')}\nÄ`).subarray(0, -1),
      fails: 'file.encoding',
    },
    {
      name: 'overlong-utf8',
      bytes: Buffer.concat([text(head, ''), Buffer.from([0xc0, 0xaf]), Buffer.from(',25,1,\n')]),
      fails: 'file.encoding',
    },
    {
      name: 'surrogate-utf8',
      bytes: Buffer.concat([
        text(head, ''),
        Buffer.from([0xed, 0xa0, 0x80]),
        Buffer.from(',25,1,\n'),
      ]),
      fails: 'file.encoding',
    },
    {
      name: 'bom-outranks',
      bytes: Buffer.from(`\ufeff${head}\n${row('Ä')}\n`),
      mapping: plainIn('windows-1252'),
      taken: ['Ä'],
    },
    {
      name: 'quoted',
      bytes: text(head, '"A","25","16000001.5",""', '"B",25,16000001,'),
      taken: ['A', 'B'],
    },
    {
      name: 'quoted-header',
      bytes: text('"serial","temperature_c","frequency_hz","measured_at"', row('A')),
      taken: ['A'],
    },
    { name: 'doubled-quotes', bytes: text(head, '"A ""1""",25,16000001,'), taken: ['A "1"'] },
    { name: 'doubled-quotes-only', bytes: text(head, '"""",25,16000001,'), taken: ['"'] },
    { name: 'quote-inside', bytes: text(head, '3"x,25,16000001,'), taken: ['3"x'] },
    { name: 'delimiter-in-quotes', bytes: text(head, '"A,1",25,16000001,'), taken: ['A,1'] },
    {
      name: 'line-end-in-quotes',
      bytes: text(head, '"A\n1",25,16000001,', row('B')),
      taken: ['B'],
      refused: ['2:serial.control'],
    },
    {
      name: 'line-numbers-after-quotes',
      bytes: text(head, '"A\n\r\n\r1",25,16000001,', row('B', 'x')),
      refused: ['2:serial.control', '6:number.unreadable'],
    },
    { name: 'space-after-quote', bytes: text(head, '"A" ,25,16000001,'), taken: ['A'] },
    {
      name: 'unclosed-quote',
      bytes: text(head, row('A'), '"B,25,16000001,', row('C'), row('D')),
      taken: ['A', 'C', 'D'],
      refused: ['3:quotes'],
    },
    {
      name: 'quote-closed-early',
      bytes: text(head, '"A"x,25,16000001,', row('B')),
      taken: ['B'],
      refused: ['2:quotes'],
    },
    {
      name: 'every-line-half-quoted',
      bytes: text(head, '"A,25,1,', '"B,25,1,', '"C,25,1,', row('D')),
      taken: ['D'],
      refused: ['2:quotes', '3:quotes', '4:quotes'],
    },
    {
      name: 'lost-quote-in-large-file',
      bytes: text(
        head,
        '"A,25,16000001,',
        ...Array.from({ length: 3000 }, (_, i) => row(`N${i}`)),
        '',
      ),
      refused: ['2:quotes'],
    },
    {
      name: 'nul-in-serial',
      bytes: text(head, row('A\0'), row('B')),
      taken: ['B'],
      refused: ['2:serial.control'],
    },
    {
      name: 'nul-in-number',
      bytes: text(head, row('A', '160\u00000000'), row('B')),
      taken: ['B'],
      refused: ['2:number.unreadable'],
    },
    {
      name: 'control-in-serial',
      bytes: text(head, row('A\u001b[31m'), row('B')),
      taken: ['B'],
      refused: ['2:serial.control'],
    },
    {
      name: 'nan',
      bytes: text(head, row('A', 'NaN'), row('B', 'Infinity'), row('C', '-inf')),
      refused: ['2:number.not_finite', '3:number.not_finite', '4:number.not_finite'],
    },
    {
      name: 'huge-exponents',
      bytes: text(head, row('A', '1e400'), row('B', '1e-400'), row('C', '1.6e7')),
      taken: ['C'],
      refused: ['2:number.out_of_range', '3:number.out_of_range'],
    },
    {
      name: 'not-numbers',
      bytes: text(
        head,
        row('A', '0x10'),
        row('B', '1..2'),
        row('C', '--1'),
        row('D', '.'),
        row('E', '1_000'),
      ),
      refused: ['2', '3', '4', '5', '6'].map((n) => `${n}:number.unreadable`),
    },
    {
      name: 'zero-and-negative',
      bytes: text(head, row('A', '0'), row('B', '-16000000'), row('C', '0.000')),
      refused: ['2', '3', '4'].map((n) => `${n}:frequency.not_positive`),
    },
    {
      name: 'missing',
      bytes: text(head, ',25,16000001,', 'B,25,,', 'C,,16000001,'),
      taken: ['C'],
      refused: ['2:serial.missing', '3:frequency.missing'],
    },
    {
      name: 'many-digits',
      bytes: text(
        head,
        row('A', `16000000.${repeat('1', 30)}`),
        row('B', `16000000.${repeat('1', 31)}`),
        row('C', repeat('9', 21)),
      ),
      taken: ['A'],
      refused: ['3:number.too_long', '4:number.too_long'],
    },
    {
      name: 'leading-zeros',
      bytes: text(head, row('007'), row('07'), row('7', '0016000001.50')),
      taken: ['007', '07', '7'],
    },
    {
      name: 'spaces',
      bytes: text(head, ' A , 25 , 16000001 , 2026-01-01T00:00:00Z '),
      taken: ['A'],
    },
    { name: 'plus-signs', bytes: text(head, 'A,+25,+16000001,'), taken: ['A'] },
    {
      name: 'columns',
      bytes: text(head, 'A,25', 'B,25,16000001,,', row('C')),
      taken: ['C'],
      refused: ['2:columns', '3:columns'],
    },
    {
      name: 'ten-thousand-columns',
      bytes: text(head, `A${repeat(',1', 9999)}`, row('B')),
      taken: ['B'],
      refused: ['2:columns'],
    },
    {
      name: 'long-line',
      bytes: text(head, row(repeat('x', 200_000)), row('B')),
      taken: ['B'],
      refused: ['2:line.too_long'],
    },
    {
      name: 'long-quoted-line',
      bytes: text(head, `"${repeat('x', 200_000)}",25,1,`, row('B')),
      taken: ['B'],
      refused: ['2:line.too_long'],
    },
    {
      name: 'long-serial',
      bytes: text(head, row(repeat('x', 81)), row(repeat('y', 80))),
      taken: [repeat('y', 80)],
      refused: ['2:serial.too_long'],
    },
    {
      name: 'duplicates',
      bytes: text(
        head,
        row('A'),
        row('B'),
        row('A'),
        'A,25.00,16000002,',
        'A,85,16000003,',
        'A,,16000004,',
      ),
      taken: ['A', 'B', 'A'],
      refused: ['4:duplicate', '5:duplicate', '7:duplicate'],
    },
    {
      name: 'duplicates-out-of-order',
      bytes: text(head, row('S10'), row('S9'), row('S10'), row('S8'), row('S9')),
      taken: ['S10', 'S9', 'S8'],
      refused: ['4:duplicate', '6:duplicate'],
    },
    {
      name: 'temperatures',
      bytes: text(
        head,
        'A,-300,16000001,',
        'B,5000,16000001,',
        'C,warm,16000001,',
        'D,-40.25,16000001,',
      ),
      taken: ['D'],
      refused: ['2:temperature.impossible', '3:temperature.impossible', '4:number.unreadable'],
    },
    {
      name: 'times',
      bytes: text(
        head,
        ...[
          '2026-11-30T10:00:00Z',
          '2026-11-30 10:00',
          '2026-11-30T10:00:00.123456789+02:00',
          '2026-11-30',
          '2026-02-30',
          '30.11.2026',
          '2026-11-30T25:00:00Z',
          '2026-11-30T10:00:00+99:00',
        ].map((t, i) => `T${i},25,16000001,${t}`),
      ),
      taken: ['T0', 'T1', 'T2', 'T3'],
      refused: ['6', '7', '8', '9'].map((n) => `${n}:time.not_iso`),
    },
    {
      name: 'semicolons',
      bytes: text('s;f', 'A;16000001,5', 'B;16.000.001,5', 'C;16 000 001,5'),
      mapping: semicolon,
      taken: ['A', 'B', 'C'],
    },
    {
      name: 'wrong-decimal-sign',
      bytes: text('s;f', 'A;1.234', 'B;16000001.5'),
      mapping: semicolon,
      refused: ['2:number.ambiguous', '3:number.unreadable'],
    },
    {
      name: 'tabs',
      bytes: text('s\tf', 'A\t16000001.5', 'B,1\t16000002'),
      mapping: { ...onlyFrequency('Hz'), delimiter: '\t' },
      taken: ['A', 'B,1'],
    },
    {
      name: 'megahertz',
      bytes: text('s,f', 'A,15.9999877', 'B,1.6e1'),
      mapping: onlyFrequency('MHz'),
      taken: ['A', 'B'],
    },
    {
      name: 'parts-per-million',
      bytes: text('s,f', 'A,-1.25', 'B,0', 'C,-2000000'),
      mapping: onlyFrequency('ppm'),
      taken: ['A', 'B'],
      refused: ['4:frequency.not_positive'],
    },
    {
      name: 'no-header',
      bytes: text('A,16000001', 'B,16000002'),
      mapping: { ...onlyFrequency('Hz'), headerRow: false },
      taken: ['A', 'B'],
    },
    {
      name: 'one-column',
      bytes: text('16000001', '16000002'),
      mapping: { headerRow: false, serial: 'U', columns: [{ target: 'frequency', unit: 'Hz' }] },
      taken: ['U1', 'U2'],
    },
    {
      name: 'column-per-temperature',
      bytes: text('s,-40,25', 'A,15999999,16000001', 'B,,16000001', 'C,15999999,x', 'A,1,2', 'D,,'),
      mapping: {
        shape: 'unit_per_row',
        columns: [
          { target: 'serial' },
          { target: 'frequency', unit: 'Hz', temperatureC: -40 },
          { target: 'frequency', unit: 'Hz', temperatureC: 25 },
        ],
      },
      taken: ['A', 'A', 'B'],
      refused: ['4:number.unreadable', '5:duplicate', '6:frequency.missing'],
    },
    {
      name: 'time-series',
      bytes: text('t,f', '0,16000001', '0.5,16000001', '1,16000002', '0.5,16000003', ',16000003'),
      mapping: {
        shape: 'time_series',
        serial: 'X',
        startedAt: '2026-01-01T00:00:00Z',
        columns: [{ target: 'elapsedSeconds' }, { target: 'frequency', unit: 'Hz' }],
      },
      taken: ['X', 'X', 'X'],
      refused: ['5:duplicate', '6:time.missing'],
    },
    { name: 'header-of-another-file', bytes: text('a,b', row('A')), fails: 'file.columns' },
    {
      name: 'unclosed-header',
      bytes: text('"serial,temperature_c', row('A')),
      fails: 'file.header',
    },
    {
      name: 'reason-column',
      bytes: text(`${head},reason`, `${row('A')},line 7: too cold`),
      taken: ['A'],
    },
    {
      name: 'own-trailer',
      bytes: text(head, row('A'), '# end of export: 1 rows', ''),
      taken: ['A'],
    },
    {
      name: 'formulas',
      bytes: text(head, row("'=1+1"), row("''=1"), row("'plain"), row('=2'), row("'-7")),
      taken: ['=1+1', "'=1", "'plain", '=2', '-7'],
    },
    { name: 'gzip', bytes: gzipSync(text(head, row('A'), row('B'))), taken: ['A', 'B'] },
    {
      name: 'gzip-members',
      bytes: Buffer.concat([gzipSync(text(head, '')), gzipSync(text(row('A'), ''))]),
      taken: ['A'],
    },
    {
      name: 'gzip-cut',
      bytes: gzipSync(Buffer.from(head + repeat(`\n${row('A')}`, 50))).subarray(0, -20),
      fails: 'file.gzip_damaged',
    },
    {
      name: 'gzip-bomb',
      bytes: gzipSync(Buffer.concat([text(head, ''), Buffer.alloc(40 * 1024 * 1024, 'a')])),
      fails: 'file.unpacks_too_large',
    },
  ];
}

/** Which decimal sign the values of a file use; `ambiguous` when "1.234" is all there is to go by. */
export function proposeDecimalSign(
  rows: string[][],
  delimiter: string,
): { decimalSign: '.' | ','; ambiguous: string | null } {
  if (delimiter === ',') {
    const quotedComma = rows.flat().some((value) => /^[+-]?\d+,\d+$/.test(value));
    if (!quotedComma) return { decimalSign: '.', ambiguous: null };
  }
  let point = 0;
  let comma = 0;
  let doubtful: string | null = null;
  let doubtfulSign: '.' | ',' = '.';
  for (const value of rows.flat()) {
    const match = /^[+-]?(\d[\d.,]*)(?:[eE][+-]?\d+)?$/.exec(value);
    if (!match) continue;
    const body = match[1]!;
    const points = body.split('.').length - 1;
    const commas = body.split(',').length - 1;
    if (points + commas === 0) continue;
    if (points && commas) {
      if (body.lastIndexOf('.') > body.lastIndexOf(',')) point += 1;
      else comma += 1;
    } else if (points > 1) comma += 1;
    else if (commas > 1) point += 1;
    else if (/^[1-9]\d{0,2}[.,]\d{3}$/.test(body)) {
      doubtful ??= body;
      doubtfulSign = points ? '.' : ',';
    } else if (points) point += 1;
    else comma += 1;
  }
  if (point || comma) return { decimalSign: comma > point ? ',' : '.', ambiguous: null };
  return { decimalSign: doubtfulSign, ambiguous: doubtful };
}

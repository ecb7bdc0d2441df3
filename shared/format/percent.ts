import { formatNumber, placesFor, type NumberOptions } from './number';
import { type Quantity, quantityText } from './quantity';

const SMALLEST_SHOWN = 1e-6;

/**
 * A share as a percentage, two significant digits unless told otherwise.
 * Near the whole the digits count from the missing rest, so that 0.99984 reads 99.98 % and not 100 %;
 * what is not nought never reads 0 %, what is not all never reads 100 %.
 */
export function percentParts(
  share: number | null | undefined,
  options: NumberOptions = {},
): Quantity {
  const unit = '%';
  if (share === null || share === undefined || !Number.isFinite(share))
    return { number: '–', unit };
  if (share > 0 && share < SMALLEST_SHOWN)
    return { number: `<${formatNumber(SMALLEST_SHOWN * 100, { significant: 1 })}`, unit };
  if (share < 1 && share > 1 - SMALLEST_SHOWN)
    return { number: `>${formatNumber((1 - SMALLEST_SHOWN) * 100, { decimals: 4 })}`, unit };
  const significant = options.significant ?? 2;
  if (options.decimals !== undefined) {
    const places = keepsApart(share, options.decimals);
    return { number: formatNumber(share * 100, { ...options, decimals: places }), unit };
  }
  if (share > 0.9 && share < 1) {
    const rest = (1 - share) * 100;
    return {
      number: formatNumber(share * 100, {
        ...options,
        decimals: placesFor(rest, Math.max(1, significant - 1)),
      }),
      unit,
    };
  }
  return { number: formatNumber(share * 100, { ...options, significant }), unit };
}

export function percent(share: number | null | undefined, options?: NumberOptions): string {
  return quantityText(percentParts(share, options));
}

/** Two shares that differ, written with as many digits as it takes to see that they do. */
export function percentPair(first: number, second: number): [string, string] {
  let significant = 2;
  while (
    significant < 6 &&
    first !== second &&
    percent(first, { significant }) === percent(second, { significant })
  )
    significant += 1;
  return [percent(first, { significant }), percent(second, { significant })];
}

/** A percentage that stands in a rule ('AQL 0.25 %', limiting quality 5 %), written as it was set. */
export function percentAsSet(valuePercent: number): string {
  return quantityText({ number: formatNumber(valuePercent, { significant: 6 }), unit: '%' });
}

function keepsApart(share: number, decimals: number): number {
  let places = decimals;
  const misleads = () => {
    const shown = Number((share * 100).toFixed(places));
    return (shown === 0 && share > 0) || (shown === 100 && share < 1);
  };
  while (places < 6 && misleads()) places += 1;
  return places;
}

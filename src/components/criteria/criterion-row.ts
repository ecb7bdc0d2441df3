/** One criterion in words, with its unit; '' where nothing is set. */
export interface CriterionRow {
  key: string;
  label: string;
  value: string;
}

export interface RowPair {
  key: string;
  label: string;
  before: string;
  after: string;
  differs: boolean;
}

/** The rows of two revisions beside each other, in the order of the first. */
export function pairRows(
  before: readonly CriterionRow[],
  after: readonly CriterionRow[],
): RowPair[] {
  const other = new Map(after.map((row) => [row.key, row.value]));
  return before.map(({ key, label, value }) => {
    const now = other.get(key) ?? '';
    return { key, label, before: value, after: now, differs: value !== now };
  });
}

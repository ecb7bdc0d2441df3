/** What a form holds while one types: a number that is not there yet is null. */
export type FormValues<Fields> = {
  [Key in keyof Fields]: Fields[Key] extends number ? number | null : Fields[Key];
};

interface Issue {
  path: PropertyKey[];
  message: string;
  code?: string;
  minimum?: unknown;
  maximum?: unknown;
}

type Translate = (key: string, values?: Record<string, unknown>) => string;

/** A schema's own sentence; where the schema library speaks for it, ours. */
function sentence(issue: Issue, t: Translate): string {
  if (/^Invalid (input|option)/.test(issue.message)) return t('criteria.needed');
  if (issue.message.startsWith('Too small'))
    return Number(issue.minimum) === 0
      ? t('criteria.notBelowZero')
      : t('form.atLeast', { limit: String(issue.minimum) });
  if (issue.message.startsWith('Too big'))
    return t('form.atMost', { limit: String(issue.maximum) });
  return issue.message;
}

/**
 * What is wrong with nested criteria, told at the field of the form that holds it: the last name of the path, or what
 * `renamed` calls it there.
 */
export function fieldsOfIssues(
  issues: readonly Issue[],
  t: Translate,
  renamed: Record<string, string> = {},
): Record<string, string> {
  const errors: Record<string, string> = {};
  for (const issue of issues) {
    const name = String(issue.path.findLast((part) => typeof part === 'string') ?? '');
    errors[renamed[name] ?? name] ??= sentence(issue, t);
  }
  return errors;
}

/** The server names nested places by their whole path; the form knows the last name. */
export function fieldsOfServer(
  fields: Readonly<Record<string, string>>,
  renamed: Record<string, string> = {},
): Record<string, string> {
  return Object.fromEntries(
    Object.entries(fields).map(([path, message]) => {
      const name = path.split('.').findLast((part) => !/^\d+$/.test(part)) ?? path;
      return [renamed[name] ?? name, message];
    }),
  );
}

/** A share as a percentage that shows no rounding of binary numbers. */
export const toPercent = (share: number): number => Number((share * 100).toPrecision(12));
export const fromPercent = (percent: number | null): number | null =>
  percent === null ? null : Number((percent / 100).toPrecision(12));

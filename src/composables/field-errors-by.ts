import { type FieldErrors } from './useForm';

interface Issue {
  path: PropertyKey[];
  message: string;
}
interface Schema {
  safeParse(values: unknown): { success: boolean; error?: { issues: Issue[] } };
}

/** Makes a form's `validate` from a schema of shared/contract: the first thing wrong with each field. */
export function fieldErrorsBy<Values extends object>(schema: Schema) {
  return (values: Values): FieldErrors<Values> => {
    const errors: Record<string, string> = {};
    for (const { path, message } of schema.safeParse(values).error?.issues ?? []) {
      const field = String(path[0] ?? '');
      errors[field] ??= message;
    }
    return errors as FieldErrors<Values>;
  };
}

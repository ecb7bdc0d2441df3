import { ApiError } from '@/api/api-error';
import { fieldsOfServer } from './form-values';

/** Sends, and lets a refusal of the server speak of the form's own fields. */
export async function sendNested<Answer>(
  send: () => Promise<Answer>,
  renamed: Record<string, string>,
): Promise<Answer> {
  try {
    return await send();
  } catch (error) {
    if (!(error instanceof ApiError)) throw error;
    throw new ApiError(
      error.status,
      error.code,
      error.message,
      fieldsOfServer(error.fields, renamed),
    );
  }
}

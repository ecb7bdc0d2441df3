import { InvalidInput } from '../../http/errors';
import { hashPassword } from './password';
import { passwordRefusal } from './password-refusal';

/** Hash of a new password, or InvalidInput with the reason why it may not be used. */
export async function newPasswordHash(password: string, own: string[]): Promise<string> {
  const refusal = passwordRefusal(password, own);
  if (refusal) throw new InvalidInput(refusal, { newPassword: refusal }, 'password.common');
  return hashPassword(password);
}

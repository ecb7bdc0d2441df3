import { randomBytes } from 'node:crypto';
import { type Transaction } from 'sequelize';
import { config } from '../../config';
import { sha256Hex } from '../../history/canonical';
import { PersonLink } from '../../models';

/** How long a link works. */
export const linkHours = { invitation: 72, reset: 1, first_administrator: 24 } as const;

/** A new single-use link of 256 random bits; only its hash is kept. Older links of the same person die. */
export async function issueLink(
  transaction: Transaction,
  purpose: keyof typeof linkHours,
  personId: string | null,
): Promise<{ url: string; link: PersonLink }> {
  await killLinks(transaction, personId);
  const token = randomBytes(32).toString('base64url');
  const link = await PersonLink.create(
    {
      personId,
      purpose,
      tokenHash: sha256Hex(token),
      expiresAt: new Date(Date.now() + linkHours[purpose] * 3600_000),
    },
    { transaction },
  );
  return { url: `${config().PUBLIC_URL}/links/${token}`, link };
}

/** Every unused link of a person (or, for null, of the first administrator) stops working. */
export async function killLinks(transaction: Transaction, personId: string | null): Promise<void> {
  await PersonLink.update(
    { expiresAt: new Date(Date.now() - 1) },
    { where: { personId, usedAt: null }, transaction },
  );
}

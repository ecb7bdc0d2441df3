import { type z } from 'zod';
import { type LinkInfo } from '@shared/contract/session';
import { type LiveLink } from '../services/links/find-link';

export function presentLink({ link, person }: LiveLink): z.output<typeof LinkInfo> {
  return {
    purpose: link.purpose,
    name: person?.name ?? '',
    email: person?.email ?? '',
    expiresAt: link.expiresAt.toISOString(),
  };
}

import { z } from 'zod';
import { OptionalLongText } from '@shared/contract/common';
import { RevisionName } from '@shared/contract/revisions';
import { fieldsOfIssues } from './form-values';

const schema = z.object({ revision: RevisionName, changeNote: OptionalLongText });
type Translate = (key: string, values?: Record<string, unknown>) => string;

/** What is wrong with a revision's name or note. */
export const revisionErrors = (
  { revision, changeNote }: { revision: string; changeNote: string },
  t: Translate,
): Record<string, string> =>
  fieldsOfIssues(schema.safeParse({ revision, changeNote }).error?.issues ?? [], t);

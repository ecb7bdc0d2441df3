const greatestBytes = 10 * 1024 * 1024;
export const greatestCount = 5;
export const evidenceExtensions = ['pdf', 'png', 'jpg', 'jpeg', 'csv', 'txt', 'xlsx'] as const;

export interface FileRefusal {
  key: 'tooMany' | 'tooLarge' | 'wrongType' | 'isEmpty';
  name: string;
}

/** What the server would refuse anyway, said before a slow line carries it; the content is judged there. */
export function refusalOf(files: readonly Pick<File, 'name' | 'size'>[]): FileRefusal | null {
  if (files.length > greatestCount) return { key: 'tooMany', name: '' };
  for (const { name, size } of files) {
    const extension = /\.([a-z0-9]+)$/i.exec(name)?.[1]?.toLowerCase() ?? '';
    if (!(evidenceExtensions as readonly string[]).includes(extension))
      return { key: 'wrongType', name };
    if (size > greatestBytes) return { key: 'tooLarge', name };
    if (size === 0) return { key: 'isEmpty', name };
  }
  return null;
}

/** As shared/contract/session asks; written here again because the pages before signing in load no schemas. */
export const leastPasswordLength = 15;

/** What is plainly not an address; the server judges the rest by sending a mail there. */
export function isMailAddress(text: string): boolean {
  return /^[^\s@]+@[^\s@]+\.[^\s@]+$/.test(text.trim());
}

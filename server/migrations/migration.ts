/** One numbered, reversible step. A step is SQL in one transaction: it happens whole or not at all. */
export interface Migration {
  name: string;
  up: string;
  down: string;
}

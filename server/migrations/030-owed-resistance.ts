import { type Migration } from './migration';

/** A part that limits the resistance owes a resistance of each unit of the sample. */
export const owedResistance: Migration = {
  name: '030-owed-resistance',
  up: `ALTER TABLE lots ADD COLUMN units_lacking_resistance integer NOT NULL DEFAULT 0`,
  down: `ALTER TABLE lots DROP COLUMN units_lacking_resistance`,
};

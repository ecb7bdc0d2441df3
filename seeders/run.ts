import { Person } from '../server/models';
import { readConfig, useConfig } from '../server/config';
import { openDatabase } from '../server/database/connection';
import { demoPassphrase, setDemoPassphrase } from './people';
import { seedDemo } from './demo';

/** Fills an empty database with the demo; in a filled one it only sets the demo accounts' passphrase. */
const settings = readConfig();
useConfig(settings);
const database = openDatabase({ url: settings.DATABASE_URL, poolMax: 4 });
try {
  const passphrase = demoPassphrase();
  if ((await Person.count()) === 0) await seedDemo(passphrase);
  else await setDemoPassphrase(passphrase);
} finally {
  await database.close();
}

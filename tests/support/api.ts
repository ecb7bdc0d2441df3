import { randomBytes } from 'node:crypto';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type Express } from 'express';
import request from 'supertest';
import { createApp } from '../../server/app';
import { readConfig, useConfig, type Config } from '../../server/config';
import { openDatabase, type Database } from '../../server/database/connection';
import { Person, Supplier } from '../../server/models';
import { hashPassword } from '../../server/services/sign-in/password';
import { createTestDatabase, type TestDatabase } from './database';

/*
 * The application on a database of its own:
 *
 *   const api = await startApi();
 *   const technician = await api.agentFor('technician');
 *   await technician.get('/api/lots').expect(200);
 *   await api.close();
 *
 * Agents are signed in and send X-Quartzhold; `stranger()` is not signed in but sends it too.
 */
export const passphrase = 'a heron waits on the weir';

/** One person for each role, a second quality engineer, and contacts of two suppliers. */
export const cast = {
  technician: { name: 'Tilda Technician', role: 'technician' },
  quality: { name: 'Quentin Quality', role: 'quality_engineer' },
  quality2: { name: 'Quirina Quality', role: 'quality_engineer' },
  supplier: { name: 'Sune Supplier', role: 'supplier_contact' },
  supplier2: { name: 'Sonja Supplier', role: 'supplier_contact' },
  auditor: { name: 'Aude Auditor', role: 'auditor' },
  admin: { name: 'Ada Admin', role: 'administrator' },
} as const;
export type CastName = keyof typeof cast;

const byRole = {
  technician: 'technician',
  quality_engineer: 'quality',
  supplier_contact: 'supplier',
  auditor: 'auditor',
  administrator: 'admin',
} as const satisfies Record<(typeof cast)[CastName]['role'], CastName>;

export type Agent = ReturnType<typeof request.agent>;

export interface Api {
  app: Express;
  config: Config;
  database: Database;
  testDatabase: TestDatabase;
  people: Record<CastName, Person>;
  suppliers: { first: Supplier; second: Supplier };
  /** A signed-in agent, by role, by name of the cast, or by e-mail address; each call is a session of its own. */
  agentFor(who: keyof typeof byRole | CastName | (string & {})): Promise<Agent>;
  /** Nobody, but from our own page. */
  stranger(): Agent;
  close(): Promise<void>;
}

export function testConfig(databaseUrl: string, changes: Partial<Config> = {}): Config {
  // Checkpoints of one database's history mean nothing for another's.
  const outside = mkdtempSync(join(tmpdir(), 'quartzhold-checkpoints-'));
  const config = readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: databaseUrl,
    SMTP_URL: 'smtp://127.0.0.1:1',
    PUBLIC_URL: 'http://quartzhold.test',
    SESSION_SECRET: randomBytes(32).toString('hex'),
    LOG_LEVEL: 'silent',
    CHECKPOINT_KEY_FILE: join(outside, 'checkpoint.pem'),
    CHECKPOINT_FOLDER: join(outside, 'checkpoints'),
  });
  return { ...config, ...changes };
}

export async function startApi(changes: Partial<Config> = {}): Promise<Api> {
  const testDatabase = await createTestDatabase();
  const config = testConfig(testDatabase.appUrl, changes);
  useConfig(config);
  const database = openDatabase({ url: testDatabase.appUrl, poolMax: 5 });
  const { people, suppliers } = await seedPeople();
  const app = createApp();
  const stranger = () => request.agent(app).set('X-Quartzhold', '1');
  return {
    app,
    config,
    database,
    testDatabase,
    people,
    suppliers,
    stranger,
    async agentFor(who) {
      const name = who in byRole ? byRole[who as keyof typeof byRole] : who;
      const email = name in cast ? emailOf(name as CastName) : name;
      const agent = stranger();
      await agent.post('/api/session').send({ email, password: passphrase }).expect(200);
      return agent;
    },
    async close() {
      await database.close();
      await testDatabase.drop();
    },
  };
}

export function emailOf(name: CastName): string {
  return `${name}@quartzhold.test`;
}

async function seedPeople() {
  const passwordHash = await hashPassword(passphrase);
  const first = await Supplier.create({ name: 'Nordfjord Crystals', location: 'Bergen' });
  const second = await Supplier.create({ name: 'Halvøy Resonators', location: 'Tromsø' });
  const supplierOf: Partial<Record<CastName, string>> = {
    supplier: first.id,
    supplier2: second.id,
  };
  const rows = await Person.bulkCreate(
    (Object.keys(cast) as CastName[]).map((name) => ({
      ...cast[name],
      email: emailOf(name),
      supplierId: supplierOf[name] ?? null,
      passwordHash,
      state: 'active' as const,
    })),
    { returning: true },
  );
  const people = Object.fromEntries(
    (Object.keys(cast) as CastName[]).map((name, index) => [name, rows[index]!]),
  ) as Record<CastName, Person>;
  return { people, suppliers: { first, second } };
}

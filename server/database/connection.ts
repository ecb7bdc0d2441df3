import { type Client, Pool, types } from 'pg';
import { Sequelize, type Transaction } from 'sequelize';
import { initialiseModels } from '../models';

// numeric and bigint stay text: a binary float would lose what the counter showed. Dates without time stay text too.
types.setTypeParser(types.builtins.DATE, (value) => value);

export interface DatabaseOptions {
  url: string;
  /** Connections for ordinary requests. */
  poolMax?: number;
}

export interface Database {
  sequelize: Sequelize;
  /** For COPY, streaming reads and the session store: long work never shares the small pool of the models. */
  pool: Pool;
  /** Opens transactions that last as long as a file does (see longTransaction). */
  long: Sequelize;
  close(): Promise<void>;
}

let current: Database | undefined;

export function openDatabase({ url, poolMax = 10 }: DatabaseOptions): Database {
  const sequelize = new Sequelize(url, {
    dialect: 'postgres',
    logging: false,
    pool: { max: poolMax, min: 0, acquire: 15_000, idle: 10_000 },
    define: { underscored: true, timestamps: false },
    dialectOptions: { keepAlive: true, application_name: 'quartzhold' },
  });
  initialiseModels(sequelize);
  const pool = new Pool({
    connectionString: url,
    max: poolMax,
    keepAlive: true,
    application_name: 'quartzhold-stream',
  });
  // A restart of the database ends idle clients; without a listener that would end the process too.
  pool.on('error', () => undefined);
  const long = new Sequelize(url, {
    dialect: 'postgres',
    logging: false,
    pool: { max: 8, min: 0, acquire: 15_000, idle: 10_000 },
    dialectOptions: { keepAlive: true, application_name: 'quartzhold-long' },
  });
  current = {
    sequelize,
    pool,
    long,
    async close() {
      await Promise.allSettled([sequelize.close(), long.close(), pool.end()]);
    },
  };
  return current;
}

export function database(): Database {
  if (!current) throw new Error('The database is not open yet.');
  return current;
}

/**
 * Runs `work` in one READ COMMITTED transaction (the history is sealed in no other). The transaction is handed on by
 * hand to every query: context that travels by itself is lost in asynchronous code.
 */
export function inTransaction<Result>(
  work: (transaction: Transaction) => Promise<Result>,
): Promise<Result> {
  return database().sequelize.transaction({ isolationLevel: 'READ COMMITTED' as never }, work);
}

/** A transaction for a whole file, on connections of its own, so that slow uploads never starve ordinary requests. */
export function longTransaction(): Promise<Transaction> {
  return database().long.transaction({ isolationLevel: 'READ COMMITTED' as never });
}

/** The raw connection of a transaction: for COPY and for what Sequelize does not speak. */
export function connectionOf(transaction: Transaction): Client {
  return (transaction as unknown as { connection: Client }).connection;
}

import { createServer, type Server } from 'node:http';
import { createApp } from './app';
import { config, readConfig, useConfig, type Config } from './config';
import { database, openDatabase } from './database/connection';
import { log } from './http/request-log';
import { firstAdministratorLink } from './services/links/first-administrator';

interface Part {
  stop(): Promise<void>;
}

/** Less than the 30 s after which a supervisor kills. */
const graceMs = 20_000;

/** Starts what QUARTZHOLD_ROLE names and stops it in order. A wrong setting or a taken port ends the process at once. */
export async function startServer(): Promise<void> {
  const settings = settingsOrExit();
  useConfig(settings);
  openDatabase({ url: settings.DATABASE_URL });
  const parts: Part[] = [];
  try {
    if (settings.QUARTZHOLD_ROLE !== 'worker') parts.push(await startWeb(settings));
    if (settings.QUARTZHOLD_ROLE !== 'web') {
      const { startWorker } = await import('./jobs/worker');
      parts.push(await startWorker());
    }
  } catch (error) {
    console.error(`Quartzhold could not start: ${(error as Error).message}`);
    await stopAll(parts);
    process.exit(1);
  }
  let stopping = false;
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.on(signal, () => {
      if (stopping) return;
      stopping = true;
      // Whatever hangs must not keep the process: the next start finds everything in the database.
      setTimeout(() => process.exit(1), graceMs + 5_000).unref();
      void stopAll(parts).then(() => process.exit(0));
    });
  }
}

function settingsOrExit(): Config {
  try {
    return readConfig();
  } catch (error) {
    console.error((error as Error).message);
    process.exit(1);
  }
}

async function startWeb(settings: Config): Promise<Part> {
  if (settings.NODE_ENV === 'production') await greetFirstAdministrator();
  if (settings.secureCookies && !settings.TRUST_PROXY)
    log(settings).warn(
      'TRUST_PROXY is not set: behind a proxy that ends TLS nobody can sign in until it names that proxy.',
    );
  const server = createServer(createApp());
  // A large upload over a slow line takes longer than Node's five minutes; idle connections still end.
  server.requestTimeout = 6 * 3600_000;
  await listen(server, settings.PORT, settings.HOST);
  const address = server.address();
  const port = typeof address === 'object' && address ? address.port : settings.PORT;
  log(settings).info(`Listening on http://${settings.HOST}:${port}`);
  return { stop: () => closeServer(server) };
}

/** A server in production without people has nobody who could invite the first one. */
async function greetFirstAdministrator(): Promise<void> {
  const link = await firstAdministratorLink();
  if (!link) return;
  console.log(
    `There is nobody in the database yet. Make the first administrator within 24 hours, by this link that works once:\n${link}`,
  );
}

function listen(server: Server, port: number, host: string): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      server.off('error', reject);
      resolve();
    });
  });
}

/** Takes no new requests, lets running ones end, then cuts what is left: event streams never end by themselves. */
function closeServer(server: Server): Promise<void> {
  return new Promise((resolve) => {
    const cut = setTimeout(() => server.closeAllConnections(), graceMs / 2);
    server.close(() => {
      clearTimeout(cut);
      resolve();
    });
    server.closeIdleConnections();
  });
}

async function stopAll(parts: Part[]): Promise<void> {
  await Promise.allSettled(parts.map((part) => part.stop()));
  await database().close();
  log(config()).flush();
}

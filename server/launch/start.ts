import { ensureBuilt } from './build';
import { LaunchError } from './command';
import { greet } from './greeting';
import { waitForHealth } from './health';
import { choosePort, localAddress } from './ports';
import { Running } from './running';
import { readLaunchSettings } from './settings';
import { prepareSurroundings } from './surroundings';

/** npm start: everything Quartzhold needs on this machine, then its web server and worker. */
const running = new Running();
try {
  const settings = readLaunchSettings(process.env);
  const port = await choosePort(settings.port, 3000);
  const address = localAddress(settings.config.HOST, port);
  await ensureBuilt('client', 'server');
  const surroundings = await prepareSurroundings(settings, running, address);

  const log = settings.production ? 'console' : 'file';
  const env = { ...surroundings.env, PORT: String(port) };
  const server = ['--enable-source-maps', 'dist/server/index.js'];
  running.start({
    title: 'worker',
    arguments: server,
    env: { ...env, QUARTZHOLD_ROLE: 'worker' },
    log,
  });
  running.start({ title: 'web', arguments: server, env: { ...env, QUARTZHOLD_ROLE: 'web' }, log });
  await waitForHealth(address);
  if (!running.ending) greet(surroundings.env.PUBLIC_URL ?? address, surroundings);
} catch (error) {
  if (!running.ending) {
    console.error(error instanceof LaunchError ? error.message : error);
    await running.end(1);
  }
}

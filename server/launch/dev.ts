import { LaunchError } from './command';
import { greet } from './greeting';
import { waitForHealth } from './health';
import { choosePort } from './ports';
import { Running } from './running';
import { readLaunchSettings } from './settings';
import { prepareSurroundings } from './surroundings';

/** npm run dev: as npm start, with the sources watched and pages reloaded as they change. */
const running = new Running();
try {
  const settings = readLaunchSettings(process.env);
  const pagePort = await choosePort(settings.port, 5173);
  const apiPort = await choosePort(undefined, Math.max(3000, pagePort + 1));
  const address = `http://127.0.0.1:${pagePort}`;
  const api = `http://127.0.0.1:${apiPort}`;
  const surroundings = await prepareSurroundings(settings, running, address);

  const env = { ...surroundings.env, HOST: '127.0.0.1', PORT: String(apiPort) };
  const watched = [
    'node_modules/tsx/dist/cli.mjs',
    'watch',
    '--clear-screen=false',
    'server/index.ts',
  ];
  for (const role of ['worker', 'web']) {
    const roleEnv = { ...env, QUARTZHOLD_ROLE: role };
    running.start({ title: role, arguments: watched, env: roleEnv, log: 'console' });
  }
  running.start({
    title: 'pages',
    arguments: [
      'node_modules/vite/bin/vite.js',
      ...['--host', '127.0.0.1', '--port', String(pagePort), '--strictPort'],
      ...['--clearScreen', 'false'],
    ],
    env: { ...process.env, QUARTZHOLD_API: api },
    log: 'console',
  });
  await waitForHealth(api);
  if (!running.ending) greet(address, surroundings);
} catch (error) {
  if (!running.ending) {
    console.error(error instanceof LaunchError ? error.message : error);
    await running.end(1);
  }
}

import { createServer } from 'node:net';
import { LaunchError } from './command';

/** The port asked for, or else the first free one from `first` on. */
export async function choosePort(asked: number | undefined, first: number): Promise<number> {
  if (asked !== undefined) {
    if (await isFree(asked)) return asked;
    throw new LaunchError(
      'port_taken',
      `Setting PORT is wrong: port ${asked} is taken; name a free one, or leave PORT out and one is found.`,
    );
  }
  for (let port = first; port < first + 200; port += 1) if (await isFree(port)) return port;
  throw new LaunchError('no_port', `No port from ${first} to ${first + 199} is free.`);
}

/** Free on every address of the machine and on loopback: somebody may hold only one of them. */
async function isFree(port: number): Promise<boolean> {
  return (await canListen(port)) && (await canListen(port, '127.0.0.1'));
}

function canListen(port: number, host?: string): Promise<boolean> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** Where this machine itself reaches a server that listens on `host`. */
export function localAddress(host: string, port: number): string {
  const everywhere = host === '0.0.0.0' || host === '::';
  const name = everywhere ? '127.0.0.1' : host.includes(':') ? `[${host}]` : host;
  return `http://${name}:${port}`;
}

import { type AddressInfo } from 'node:net';
import { type Server } from 'node:net';
import { type MailFakeBehaviour, wellBehaved } from './fake-parts/behaviour';
import { Letters, type Letter } from './fake-parts/letters';
import { FakeSmtp } from './fake-parts/smtp';
import { fakeWeb } from './fake-parts/web';

export type { Letter, MailFakeBehaviour };

export interface MailFake {
  smtpUrl: string;
  pageUrl: string;
  /** Newest first. */
  letters: () => Letter[];
  clear: () => void;
  setBehaviour: (behaviour: Partial<MailFakeBehaviour>) => void;
  behaviour: () => MailFakeBehaviour;
  counts: () => { connections: number; contents: number };
  stop: () => Promise<void>;
}

/**
 * The mail server of the demo and of the tests: takes every mail, shows it on a page of its own, hands nothing on. On
 * loopback only. Port 0 takes any free one.
 */
export async function startMailFake({
  smtpPort = 0,
  pagePort = 0,
}: { smtpPort?: number; pagePort?: number } = {}): Promise<MailFake> {
  const letters = new Letters();
  const smtp = new FakeSmtp(letters);
  const web = fakeWeb(letters, smtp);
  const smtpAt = await listening(smtp.server.listen(smtpPort, '127.0.0.1'));
  let pageAt: number;
  try {
    pageAt = await listening(web.listen(pagePort, '127.0.0.1'));
  } catch (error) {
    await new Promise<void>((resolve) => smtp.server.close(() => resolve()));
    throw error;
  }
  return {
    smtpUrl: `smtp://127.0.0.1:${smtpAt}`,
    pageUrl: `http://127.0.0.1:${pageAt}/`,
    letters: () => letters.all(),
    clear: () => letters.clear(),
    setBehaviour: (behaviour) => smtp.set({ ...wellBehaved, ...behaviour }),
    behaviour: () => smtp.behaviour,
    counts: () => ({ ...smtp.counts }),
    async stop() {
      web.closeAllConnections();
      await Promise.all([
        new Promise<void>((resolve) => smtp.server.close(() => resolve())),
        new Promise<void>((resolve) => web.close(() => resolve())),
      ]);
    },
  };
}

function listening(server: Server): Promise<number> {
  return new Promise((resolve, reject) => {
    const done = () => resolve((server.address() as AddressInfo).port);
    if (server.listening) return done();
    server.once('listening', done);
    server.once('error', reject);
  });
}

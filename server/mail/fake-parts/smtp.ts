import { SMTPServer, type SMTPServerSession } from 'smtp-server';
import { type MailFakeBehaviour, wellBehaved } from './behaviour';
import { type Letters } from './letters';

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

function refusal(code: number, text: string): Error {
  return Object.assign(new Error(text), { responseCode: code });
}

/** An SMTP server that takes any mail, or misbehaves exactly as it is told. */
export class FakeSmtp {
  behaviour: MailFakeBehaviour = wellBehaved;
  /** Connections that were opened, and mails whose content arrived, kept or not. */
  readonly counts = { connections: 0, contents: 0 };
  readonly server: SMTPServer;

  constructor(private readonly letters: Letters) {
    this.server = new SMTPServer({
      name: 'mail-fake.quartzhold.test',
      banner: 'Quartzhold mail fake',
      disabledCommands: ['AUTH', 'STARTTLS'],
      hideSTARTTLS: true,
      disableReverseLookup: true,
      size: 20 * 1024 * 1024,
      closeTimeout: 200,
      onConnect: (session, done) => {
        this.counts.connections++;
        // In this mode the greeting never comes.
        if (this.behaviour.mode !== 'hang') done();
        else this.useOnce();
      },
      onRcptTo: (address, session, done) => {
        void this.judgeRecipient(session).then(
          () => done(),
          (error: Error) => done(error),
        );
      },
      onData: (stream, session, done) => {
        const pieces: Buffer[] = [];
        stream.on('data', (piece: Buffer) => pieces.push(piece));
        stream.on('end', () => {
          void this.take(Buffer.concat(pieces), session).then(
            (answer) => done(null, answer),
            (error: Error) => done(error),
          );
        });
      },
    });
    // A dropped connection is what was asked for, not a fault of the fake.
    this.server.on('error', () => undefined);
  }

  set(behaviour: MailFakeBehaviour): void {
    this.behaviour = behaviour;
    const tls = behaviour.mode === 'broken_tls';
    this.server.options.hideSTARTTLS = !tls;
    this.server.options.disabledCommands = tls ? ['AUTH'] : ['AUTH', 'STARTTLS'];
  }

  private async judgeRecipient(session: SMTPServerSession): Promise<void> {
    const { mode, delayMs } = this.behaviour;
    await pause(delayMs);
    if (mode === 'refuse_for_now') {
      this.useOnce();
      throw refusal(451, 'Told to refuse for now; try again later');
    }
    if (mode === 'refuse_for_good') {
      this.useOnce();
      throw refusal(550, 'Told to refuse for good; no such mailbox');
    }
    if (mode === 'drop_before') {
      this.useOnce();
      this.hangUp(session);
    }
  }

  private async take(raw: Buffer, session: SMTPServerSession): Promise<string> {
    this.counts.contents++;
    const { mailFrom, rcptTo } = session.envelope;
    const letter = await this.letters.take(raw, {
      from: mailFrom ? mailFrom.address : '',
      to: rcptTo.map(({ address }) => address),
    });
    if (this.behaviour.mode === 'drop_after') {
      this.useOnce();
      this.hangUp(session);
    }
    return `Taken as letter ${letter.number}`;
  }

  private useOnce(): void {
    const { times } = this.behaviour;
    if (times === null) return;
    this.set(times > 1 ? { ...this.behaviour, times: times - 1 } : wellBehaved);
  }

  private hangUp(session: SMTPServerSession): void {
    for (const connection of this.server.connections) {
      if (connection.session.id === session.id) connection._socket.destroy();
    }
  }
}

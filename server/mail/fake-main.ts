import { startMailFake } from './fake';

/** The mail fake as a process of its own: `node --import tsx server/mail/fake-main.ts [smtpPort] [pagePort]`. */
const [smtpPort, pagePort] = process.argv.slice(2).map(Number);
const fake = await startMailFake({ smtpPort: smtpPort || 0, pagePort: pagePort || 0 });
process.stdout.write(`${JSON.stringify({ smtpUrl: fake.smtpUrl, pageUrl: fake.pageUrl })}\n`);

for (const signal of ['SIGINT', 'SIGTERM'] as const) {
  process.once(signal, () => {
    void fake.stop().then(() => process.exit(0));
  });
}

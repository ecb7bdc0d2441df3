import { type MailContent } from './message';

/** The mail as plain text, for those who read it so; says all that the HTML says. */
export function textBody(content: MailContent): string {
  const { subject, strip, paragraphs, facts, link, why, choiceUrl } = content;
  const blocks = [subject, ...(strip ? [strip.sentence] : []), ...paragraphs];
  if (facts.length > 0) {
    const width = Math.max(...facts.map(([label]) => label.length)) + 2;
    blocks.push(facts.map(([label, value]) => `${`${label}:`.padEnd(width)} ${value}`).join('\n'));
  }
  if (link) blocks.push(`${link.label}:\n${link.url}`);
  blocks.push(`-- \n${why}\nChoose how you are told: ${choiceUrl}\nQuartzhold`);
  return `${blocks.join('\n\n')}\n`;
}

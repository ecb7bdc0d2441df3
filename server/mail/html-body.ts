import { paperTones } from '@shared/band-strip/svg';
import { type MailContent } from './message';
import { stripWidthPx } from './pictures';

/** Light colours only: mail programs turn colours over as they like, and a half-dark mail is unreadable. */
const colours = {
  paper: '#fbf9f6',
  sheet: '#ffffff',
  line: '#dcd5cf',
  ink: paperTones.ink,
  soft: paperTones.soft,
  accent: paperTones.allowance,
};
const font = "'Source Sans 3','Source Sans Pro','Segoe UI','Helvetica Neue',Arial,sans-serif";
const cell = `font-family:${font};font-size:15px;line-height:22px;color:${colours.ink}`;
const small = `font-family:${font};font-size:13px;line-height:18px;color:${colours.soft}`;

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
}

/** Line breaks of the writer are kept; nothing else of what a person typed becomes markup. */
function lines(text: string): string {
  return escapeHtml(text).replace(/\r?\n/g, '<br>');
}

/** The mail as HTML: tables and styles in place, because mail programs know nothing newer. */
export function htmlBody(content: MailContent): string {
  const { subject, strip, paragraphs, facts, link, why, markCid, choiceUrl } = content;
  const rows = [
    strip && picture(strip),
    ...paragraphs.map((paragraph) => row(lines(paragraph), 'padding:0 0 12px')),
    facts.length > 0 && row(factTable(facts), 'padding:4px 0 12px'),
    link && row(button(link), 'padding:8px 0 12px'),
  ].filter((part): part is string => Boolean(part));
  return (
    `<!doctype html><html lang="en"><head><meta charset="utf-8">` +
    `<meta name="viewport" content="width=device-width, initial-scale=1">` +
    `<meta name="color-scheme" content="light only"><title>${escapeHtml(subject)}</title></head>` +
    `<body style="margin:0;padding:0;background:${colours.paper}">` +
    `<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="background:${colours.paper}"><tr>` +
    `<td align="center" style="padding:24px 12px">` +
    `<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="max-width:${stripWidthPx + 56}px;background:${colours.sheet};border:1px solid ${colours.line};border-radius:3px">` +
    `<tr><td style="padding:18px 28px;border-bottom:1px solid ${colours.line}">${wordMark(markCid)}</td></tr>` +
    `<tr><td style="padding:22px 28px 10px"><table role="presentation" width="100%" cellpadding="0" cellspacing="0">` +
    row(
      `<h1 style="margin:0;font-family:${font};font-size:22px;line-height:28px;font-weight:600;color:${colours.ink}">${escapeHtml(subject)}</h1>`,
      'padding:0 0 14px',
    ) +
    rows.join('') +
    `</table></td></tr>` +
    `<tr><td style="padding:14px 28px 18px;border-top:1px solid ${colours.line};${small}">${lines(why)}<br>` +
    `<a href="${escapeHtml(choiceUrl)}" style="color:${colours.accent}">Choose how you are told</a></td></tr>` +
    `</table></td></tr></table></body></html>`
  );
}

function row(inner: string, style: string): string {
  return `<tr><td style="${style};${cell}">${inner}</td></tr>`;
}

function wordMark(markCid: string | null): string {
  const mark = markCid
    ? `<td style="padding-right:9px"><img src="cid:${markCid}" width="24" height="24" alt="" style="display:block"></td>`
    : '';
  return (
    `<table role="presentation" cellpadding="0" cellspacing="0"><tr>${mark}` +
    `<td style="font-family:${font};font-size:17px;font-weight:600;color:${colours.ink}">Quartzhold</td></tr></table>`
  );
}

function picture({ sentence, cid }: NonNullable<MailContent['strip']>): string {
  const image = cid
    ? `<img src="cid:${cid}" width="${stripWidthPx}" alt="${escapeHtml(sentence)}" style="display:block;width:100%;max-width:${stripWidthPx}px;height:auto">`
    : '';
  return row(
    `${image}<div style="${small};padding-top:4px">${escapeHtml(sentence)}</div>`,
    'padding:0 0 14px',
  );
}

function factTable(facts: MailContent['facts']): string {
  const body = facts
    .map(
      ([label, value]) =>
        `<tr><th scope="row" align="left" valign="top" style="${small};font-weight:400;width:1%;padding:5px 18px 5px 0;white-space:nowrap;border-top:1px solid ${colours.line}">${escapeHtml(label)}</th>` +
        `<td valign="top" style="${cell};padding:4px 0;border-top:1px solid ${colours.line}">${lines(value)}</td></tr>`,
    )
    .join('');
  return `<table width="100%" cellpadding="0" cellspacing="0" style="border-collapse:collapse">${body}</table>`;
}

function button({ label, url }: NonNullable<MailContent['link']>): string {
  return (
    `<a href="${escapeHtml(url)}" style="display:inline-block;background:${colours.accent};color:#ffffff;font-family:${font};` +
    `font-size:15px;font-weight:600;line-height:20px;text-decoration:none;padding:9px 18px;border-radius:3px">${escapeHtml(label)}</a>`
  );
}

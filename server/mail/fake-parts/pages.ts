import { dateTime } from '@shared/format/dates';
import { count, countOf } from '@shared/format/counts';
import { markSvg } from '@shared/brand/mark';
import { paperTones } from '@shared/band-strip/svg';
import { escapeHtml } from '../html-body';
import { fakeModes, type MailFakeBehaviour } from './behaviour';
import { type Letter } from './letters';

const style = `
  @font-face { font-family:'Source Sans 3'; src:url('/fonts/400'); font-weight:400; }
  @font-face { font-family:'Source Sans 3'; src:url('/fonts/600'); font-weight:600; }
  :root { color-scheme: light dark; --paper:#fbf9f6; --sheet:#fff; --ink:#2c2729; --soft:#6d6467; --line:#dcd5cf; --edge:#8f8588; --accent:#5d4690; --on:#fff; --wait:#8f6200; }
  @media (prefers-color-scheme: dark) { :root { --paper:#1b181a; --sheet:#231f22; --ink:#eee8e4; --soft:#a79da0; --line:#423b3f; --edge:#7b7276; --accent:#bda7e8; --on:#1b181a; --wait:#e0b454; } }
  * { box-sizing: border-box; }
  body { margin:0; background:var(--paper); color:var(--ink); font:15px/1.5 'Source Sans 3','Source Sans Pro','Segoe UI','Helvetica Neue',Arial,sans-serif; font-variant-numeric:tabular-nums lining-nums; }
  header { background:var(--sheet); border-bottom:1px solid var(--line); padding:12px 24px; display:flex; gap:10px; align-items:center; font-weight:600; }
  header small { font-weight:400; color:var(--soft); margin-left:8px; }
  header .plate { background:#fff; border-radius:3px; display:flex; padding:2px; }
  main { max-width:68rem; margin:0 auto; padding:24px; }
  h1 { font-size:27px; line-height:1.25; margin:0 0 4px; overflow-wrap:anywhere; }
  h2 { font-size:13px; color:var(--soft); font-weight:600; margin:0; }
  section { display:grid; grid-template-columns:9rem 1fr; gap:8px 24px; border-top:1px solid var(--line); padding:16px 0; }
  section > div { min-width:0; }
  @media (max-width:44rem) { section { grid-template-columns:1fr; } main { padding:16px; } }
  p { margin:0 0 8px; } .soft { color:var(--soft); }
  a { color:var(--accent); } :focus-visible { outline:2px solid var(--accent); outline-offset:2px; }
  table { width:100%; border-collapse:collapse; } .scroll { overflow-x:auto; }
  th { text-align:left; font-size:13px; font-weight:400; color:var(--soft); padding:4px 16px 4px 0; white-space:nowrap; }
  td { padding:7px 16px 7px 0; border-top:1px solid var(--line); vertical-align:top; overflow-wrap:anywhere; } td.whole { white-space:nowrap; }
  iframe { width:100%; height:36rem; border:1px solid var(--line); border-radius:3px; background:#fff; }
  pre { white-space:pre-wrap; overflow-wrap:anywhere; margin:0; font:13px/1.5 ui-monospace,'DejaVu Sans Mono',Menlo,Consolas,monospace; }
  img { max-width:100%; background:#fff; border:1px solid var(--line); border-radius:3px; }
  form { display:flex; flex-wrap:wrap; gap:12px 16px; align-items:end; margin:0; }
  label { font-size:13px; color:var(--soft); display:grid; gap:4px; }
  select,input { font:inherit; color:var(--ink); background:var(--paper); border:1px solid var(--edge); border-radius:3px; padding:6px 8px; min-height:36px; max-width:100%; }
  input { width:8rem; }
  button { font:inherit; font-weight:600; color:var(--on); background:var(--accent); border:0; border-radius:3px; padding:6px 16px; min-height:36px; cursor:pointer; }
  button.plain { background:none; color:var(--accent); border:1px solid var(--edge); }
  .note { color:var(--wait); font-weight:600; }`;

function frame(title: string, body: string): string {
  const mark = markSvg({ blank: paperTones.ink, bands: paperTones.allowance }, 24);
  return (
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">` +
    `<title>${escapeHtml(title)} · Mail fake</title><style>${style}</style></head><body>` +
    `<header><span class="plate" aria-hidden="true">${mark}</span>Quartzhold <small>Mail fake of the demo: nothing here was sent to anybody.</small></header>` +
    `<main>${body}</main></body></html>`
  );
}

export function listPage(letters: Letter[], behaviour: MailFakeBehaviour): string {
  const rows = letters
    .map(
      (letter) =>
        `<tr><td class="whole">${escapeHtml(dateTime(letter.at, 'UTC', { seconds: true }))}</td>` +
        `<td class="whole">${escapeHtml(letter.to.join(', '))}</td>` +
        `<td><a href="/letters/${letter.number}">${escapeHtml(letter.subject || 'No subject')}</a></td></tr>`,
    )
    .join('');
  const list =
    letters.length === 0
      ? `<p class="soft">No mail has come yet. Hold a lot or invite somebody, then load this page again.</p>`
      : `<div class="scroll"><table><thead><tr><th scope="col">Came at</th><th scope="col">To</th><th scope="col">Subject</th></tr></thead><tbody>${rows}</tbody></table></div>`;
  return frame(
    'Mails',
    `<h1>${letters.length === 0 ? 'No mails' : countOf(letters.length, 'mail')}</h1>` +
      `<p class="soft">What the product has sent, newest first.</p>` +
      `<section><h2>Mails</h2><div>${list}</div></section>` +
      `<section><h2>Behaviour</h2><div>${behaviourForm(behaviour)}</div></section>`,
  );
}

function behaviourForm({ mode, delayMs, times }: MailFakeBehaviour): string {
  const options = Object.entries(fakeModes)
    .map(
      ([value, words]) =>
        `<option value="${value}"${value === mode ? ' selected' : ''}>${escapeHtml(words)}</option>`,
    )
    .join('');
  const now =
    mode === 'accept' && delayMs === 0
      ? ''
      : `<p class="note">Misbehaving on purpose: ${escapeHtml(fakeModes[mode])}${times === null ? '' : `, ${count(times)} more`}.</p>`;
  return (
    `${now}<form method="post" action="/behaviour">` +
    `<label>With the next mails<select name="mode">${options}</select></label>` +
    `<label>Wait first (ms)<input name="delayMs" inputmode="numeric" value="${delayMs}"></label>` +
    `<label>Only so many times<input name="times" inputmode="numeric" placeholder="always" value="${times ?? ''}"></label>` +
    `<button>Set</button></form>` +
    `<form method="post" action="/clear" style="margin-top:16px"><button class="plain">Throw all mails away</button></form>`
  );
}

export function letterPage(letter: Letter): string {
  const { number } = letter;
  const pictures = letter.pictures
    .map(
      (picture, index) =>
        `<p><img src="/letters/${number}/pictures/${index}" alt="${escapeHtml(picture.fileName)}"></p>`,
    )
    .join('');
  const head = [
    ['From', letter.from],
    ['To', letter.to.join(', ')],
    ['Came at', dateTime(letter.at, 'UTC', { seconds: true })],
    ['Message-ID', letter.messageId],
    ...(letter.inReplyTo ? [['In reply to', letter.inReplyTo]] : []),
  ]
    .map(
      ([label, value]) =>
        `<tr><th scope="row">${label}</th><td>${escapeHtml(value ?? '')}</td></tr>`,
    )
    .join('');
  return frame(
    letter.subject,
    `<p><a href="/">All mails</a></p><h1>${escapeHtml(letter.subject || 'No subject')}</h1>` +
      `<section><h2>Envelope</h2><div><table>${head}</table></div></section>` +
      `<section><h2>As HTML</h2><div><iframe sandbox="allow-popups allow-popups-to-escape-sandbox" title="The mail as HTML" src="/letters/${number}/html"></iframe></div></section>` +
      `<section><h2>As plain text</h2><div><pre>${linked(letter.text)}</pre></div></section>` +
      (pictures ? `<section><h2>Pictures</h2><div>${pictures}</div></section>` : '') +
      `<section><h2>All headers</h2><div><pre>${escapeHtml(letter.headers.map(({ key, value }) => `${key}: ${value}`).join('\n'))}</pre></div></section>`,
  );
}

/** Addresses in plain text can be clicked, as in any mail program. */
function linked(text: string): string {
  return escapeHtml(text).replace(
    /https?:\/\/[^\s<>&#]+/g,
    (url) => `<a href="${url}" target="_blank" rel="noopener">${url}</a>`,
  );
}

/** The HTML body with its pictures put in place and its links opening outside the frame. */
export function letterHtml(letter: Letter): string {
  const html = letter.html.replace(/src="cid:([^"]+)"/g, (whole, cid: string) => {
    const index = letter.pictures.findIndex((picture) => picture.cid === cid);
    return index < 0 ? whole : `src="/letters/${letter.number}/pictures/${index}"`;
  });
  return html.replace('<head>', '<head><base target="_blank">');
}

export function missingPage(): string {
  return frame(
    'Not here',
    `<h1>Not here</h1><p>This mail was thrown away, or never came. <a href="/">All mails</a></p>`,
  );
}

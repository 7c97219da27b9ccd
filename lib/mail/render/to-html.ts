import type { MailContent } from './content';

const paper = '#F7F5F0';
const ink = '#1D2321';
const line = '#D9D4C7';
const verdigris = '#1F6F66';
const ochre = '#8A560C';
const slate = '#56616B';
const sans = "'Instrument Sans','Helvetica Neue',Arial,sans-serif";
const mono = "'Martian Mono',ui-monospace,Menlo,Consolas,monospace";

export const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (char) => `&#${char.charCodeAt(0)};`);
const lines = (text: string) => escapeHtml(text).replaceAll('\n', '<br>');

/** The HTML part: one table for old readers, styles inline, nothing fetched from anywhere. */
export function toHtml(content: MailContent): string {
  const { subject, preview, heading, paragraphs, quote, facts, action, cautions, footer } = content;
  const body = [
    `<h1 style="margin:0 0 16px;font:600 22px/1.3 ${sans};color:${ink}">${lines(heading)}</h1>`,
    ...paragraphs.map((text) => `<p style="margin:0 0 14px">${lines(text)}</p>`),
    quote &&
      `<p style="margin:0 0 4px;color:${slate};font-size:14px">${lines(quote.by)}</p>` +
        `<blockquote style="margin:0 0 16px;padding:2px 0 2px 14px;border-left:2px solid ${ink}">${lines(quote.text)}</blockquote>`,
    facts.length && factTable(facts),
    action && button(action),
    cautions?.length && cautionBox(cautions),
  ];
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1">
<meta name="color-scheme" content="light"><title>${escapeHtml(subject)}</title></head>
<body style="margin:0;padding:0;background:${paper};color:${ink};font:16px/1.5 ${sans}">
<div style="display:none;max-height:0;overflow:hidden">${escapeHtml(preview)}</div>
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="background:${paper}"><tr><td align="center" style="padding:24px 12px">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="max-width:600px;background:#FFFDF8;border:1px solid ${ink}">
<tr><td style="padding:12px 24px;border-bottom:1px solid ${ink};font:500 13px/1.4 ${mono};color:${ink}">Firstpull</td></tr>
<tr><td style="padding:24px">${body.filter(Boolean).join('\n')}</td></tr>
<tr><td style="padding:14px 24px;border-top:1px solid ${line};font-size:13px;color:${slate}">${lines(footer)}</td></tr>
</table></td></tr></table></body></html>
`;
}

function factTable(facts: MailContent['facts']): string {
  const rows = facts.map(
    ({ label, value, code }) =>
      `<tr><th align="left" valign="top" scope="row" style="padding:6px 12px 6px 0;border-top:1px solid ${line};font-weight:400;font-size:13px;color:${slate};white-space:nowrap">${lines(label)}</th>` +
      `<td valign="top" style="padding:6px 0;border-top:1px solid ${line};${code ? `font:13px/1.5 ${mono};word-break:break-all` : ''}">${lines(value)}</td></tr>`,
  );
  return `<table width="100%" cellpadding="0" cellspacing="0" style="margin:0 0 18px;border-bottom:1px solid ${line};font-size:15px">${rows.join('')}</table>`;
}

function button({ label, url }: { label: string; url: string }): string {
  const href = escapeHtml(url);
  return (
    `<p style="margin:0 0 10px"><a href="${href}" style="display:inline-block;padding:11px 18px;background:${verdigris};color:#FFFFFF;text-decoration:none;font-weight:600">${escapeHtml(label)}</a></p>` +
    `<p style="margin:0 0 16px;font-size:13px;color:${slate}">Or open <a href="${href}" style="color:${verdigris};word-break:break-all">${href}</a></p>`
  );
}

function cautionBox(cautions: string[]): string {
  const items = cautions.map((text) => `<li style="margin:0 0 4px">${lines(text)}</li>`).join('');
  return (
    `<div style="margin:0 0 8px;padding:12px 14px;border:1px solid ${ochre}"><p style="margin:0 0 6px;font-weight:600;color:${ochre}">Before anyone acts on it</p>` +
    `<ul style="margin:0;padding-left:18px;font-size:14px">${items}</ul></div>`
  );
}

import type { MailContent } from './content';

const rule = '-'.repeat(64);

/** The plain text part. */
export function toText(content: MailContent): string {
  const { heading, paragraphs, quote, facts, action, cautions, footer } = content;
  const width = Math.max(0, ...facts.map(({ label }) => label.length));
  const blocks = [
    heading,
    ...paragraphs.map(wrap),
    quote && `${quote.by}:\n${indent(quote.text)}`,
    facts.length && facts.map(({ label, value }) => `${label.padEnd(width)}  ${value}`).join('\n'),
    action && `${action.label}:\n${action.url}`,
    cautions?.length && `Before anyone acts on it:\n${cautions.map((line) => wrap(`* ${line}`)).join('\n')}`,
    `${rule}\n${wrap(footer)}\nFirstpull`,
  ];
  return `${blocks.filter(Boolean).join('\n\n')}\n`;
}

/** Breaks lines between words at 72 characters (RFC 3676 advises fewer than 78). */
function wrap(text: string): string {
  return text
    .split('\n')
    .map((line) => {
      const out: string[] = [''];
      for (const word of line.split(' ')) {
        const last = out[out.length - 1];
        if (last && last.length + 1 + word.length > 72) out.push(word);
        else out[out.length - 1] = last ? `${last} ${word}` : word;
      }
      return out.join('\n');
    })
    .join('\n');
}

const indent = (text: string) =>
  wrap(text)
    .split('\n')
    .map((line) => `  ${line}`)
    .join('\n');

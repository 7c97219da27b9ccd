import type { NoteDocument, NotePart } from './note-document';

const blocks = new Set(['paragraph', 'listItem', 'blockquote', 'bulletList', 'orderedList']);

/** The words of a note without its form: a line a paragraph, list items with a dash, mentions as `@name`. */
export function documentText(document: NoteDocument): string {
  const lines: string[] = [];
  let line = '';
  const end = () => {
    if (line.trim()) lines.push(line.trimEnd());
    line = '';
  };
  const walk = (part: NotePart): void => {
    if (part.type === 'text') line += part.text ?? '';
    else if (part.type === 'mention') line += `@${String(part.attrs?.label ?? 'someone')}`;
    else if (part.type === 'hardBreak') end();
    else {
      if (part.type === 'listItem') {
        end();
        line = '- ';
      }
      for (const inner of part.content ?? []) walk(inner);
      if (blocks.has(part.type) && line !== '- ') end();
    }
  };
  for (const part of document.content ?? []) walk(part);
  end();
  return lines.join('\n');
}

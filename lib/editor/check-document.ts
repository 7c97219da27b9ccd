import { getSchema } from '@tiptap/core';
import { Node, type Schema } from '@tiptap/pm/model';
import { invalid } from '@/lib/errors/app-error';
import { documentText } from './document-text';
import { extensions } from './extensions';
import { mentionedPeople } from './mentioned-people';
import type { NoteDocument, NotePart } from './note-document';
import { safeHref } from './safe-href';

export const maxTextChars = 10_000;
const maxDepth = 20;
const maxParts = 3000;
const uuid = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

let schema: Schema | undefined;
const noteSchema = () => (schema ??= getSchema(extensions()));

type Attrs = Record<string, unknown>;
/** What is kept of the attributes of a part; null refuses it. Anything not named here has none. */
type Keep = { known: string[]; keep: (attrs: Attrs) => Attrs | null };

const nodeAttrs: Record<string, Keep> = {
  orderedList: {
    known: ['start', 'type'],
    keep: ({ start }) =>
      start === undefined || start === null
        ? {}
        : Number.isInteger(start) && (start as number) >= 0 && (start as number) < 1e6
          ? { start }
          : null,
  },
  mention: {
    known: ['id', 'label', 'mentionSuggestionChar'],
    keep: ({ id, label }) =>
      typeof id === 'string' &&
      uuid.test(id) &&
      (label == null || (typeof label === 'string' && label.length <= 200))
        ? { id, label: label ?? null }
        : null,
  },
};
const markAttrs: Record<string, Keep> = {
  link: {
    known: ['href', 'target', 'rel', 'class', 'title'],
    keep: ({ href }) => {
      const safe = safeHref(href);
      return safe ? { href: safe } : null;
    },
  },
};
const nodeTypes = new Set(
  'doc paragraph text hardBreak bulletList orderedList listItem blockquote mention'.split(' '),
);
const markTypes = new Set(['bold', 'italic', 'link']);

const refuse = (pointer: string, detail: string) =>
  invalid('The note holds something that a note cannot hold.', [{ pointer, detail }]);

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function onlyKeys(value: Record<string, unknown>, known: string[], pointer: string): void {
  for (const key of Object.keys(value))
    if (!known.includes(key)) throw refuse(`${pointer}/${key}`, 'This is not part of a note. Leave it out.');
}

function attrsOf(given: unknown, rule: Keep | undefined, pointer: string): Attrs {
  if (given === undefined || given === null) given = {};
  if (!isRecord(given)) throw refuse(pointer, 'Attributes are an object.');
  onlyKeys(given, rule?.known ?? [], pointer);
  const kept = rule ? rule.keep(given) : {};
  if (!kept)
    throw refuse(
      pointer,
      'href' in given
        ? 'Links lead to http, https or mailto addresses only.'
        : 'This has a value that a note cannot hold.',
    );
  return kept;
}

/** Rebuilds a part from what is allowed, so that nothing else is stored. */
function rebuild(given: unknown, pointer: string, depth: number, budget: { parts: number }): NotePart {
  if (!isRecord(given)) throw refuse(pointer, 'A part of a note is an object.');
  if (depth > maxDepth) throw refuse(pointer, `Lists and quotes nest at most ${maxDepth} deep.`);
  if (--budget.parts < 0) throw refuse(pointer, `A note has at most ${maxParts} parts. Split it.`);
  onlyKeys(given, ['type', 'text', 'attrs', 'marks', 'content'], pointer);
  const { type, text, marks, content } = given;
  if (typeof type !== 'string' || !nodeTypes.has(type))
    throw refuse(`${pointer}/type`, 'A note has no such part.');
  const part: NotePart = { type };
  const attrs = attrsOf(given.attrs, nodeAttrs[type], `${pointer}/attrs`);
  if (Object.keys(attrs).length) part.attrs = attrs;
  if (text !== undefined) {
    if (type !== 'text' || typeof text !== 'string') throw refuse(`${pointer}/text`, 'Only text holds text.');
    part.text = text;
  }
  if (marks !== undefined) {
    if (!Array.isArray(marks) || marks.length > 5)
      throw refuse(`${pointer}/marks`, 'Marks are a short list.');
    const kept = marks.map((mark: unknown, i) => {
      const at = `${pointer}/marks/${i}`;
      if (!isRecord(mark)) throw refuse(at, 'A mark is an object.');
      onlyKeys(mark, ['type', 'attrs'], at);
      if (typeof mark.type !== 'string' || !markTypes.has(mark.type))
        throw refuse(`${at}/type`, 'Text is bold, italic or a link; nothing else.');
      const markAttr = attrsOf(mark.attrs, markAttrs[mark.type], `${at}/attrs`);
      return Object.keys(markAttr).length ? { type: mark.type, attrs: markAttr } : { type: mark.type };
    });
    if (kept.length) part.marks = kept;
  }
  if (content !== undefined) {
    if (!Array.isArray(content)) throw refuse(`${pointer}/content`, 'Content is a list.');
    part.content = content.map((inner, i) => rebuild(inner, `${pointer}/content/${i}`, depth + 1, budget));
  }
  return part;
}

/**
 * A note as it may be stored: only parts and attributes of the editor's schema, safe links, bounded size and
 * depth, and not empty. Throws `invalid` with a JSON pointer under `pointer` to what is not right.
 */
export function checkDocument(given: unknown, pointer = '/body'): NoteDocument {
  const document = rebuild(given, pointer, 0, { parts: maxParts }) as NoteDocument;
  if (document.type !== 'doc') throw refuse(`${pointer}/type`, 'A note is a document.');
  try {
    Node.fromJSON(noteSchema(), document).check();
  } catch {
    throw refuse(pointer, 'Its parts do not fit together as a note.');
  }
  const text = documentText(document);
  if (text.length > maxTextChars)
    throw invalid(`A note has at most ${maxTextChars} characters; this one has ${text.length}. Split it.`, [
      { pointer, detail: `At most ${maxTextChars} characters.` },
    ]);
  if (text.trim() === '' && mentionedPeople(document).length === 0)
    throw invalid('The note is empty.', [{ pointer, detail: 'Write something first.' }]);
  return document;
}

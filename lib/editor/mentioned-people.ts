import type { NoteDocument, NotePart } from './note-document';

/** Ids of the people whom a note names, each once, in order. */
export function mentionedPeople(document: NoteDocument): string[] {
  const ids = new Set<string>();
  const walk = (part: NotePart): void => {
    if (part.type === 'mention' && typeof part.attrs?.id === 'string') ids.add(part.attrs.id);
    for (const inner of part.content ?? []) walk(inner);
  };
  for (const part of document.content ?? []) walk(part);
  return [...ids];
}

/** The note with the real names of those whom it names: what the browser sent as a label proves nothing. */
export function withNames(document: NoteDocument, names: ReadonlyMap<string, string>): NoteDocument {
  const walk = (part: NotePart): NotePart => ({
    ...part,
    ...(part.type === 'mention'
      ? { attrs: { id: part.attrs?.id, label: names.get(String(part.attrs?.id)) ?? null } }
      : {}),
    ...(part.content ? { content: part.content.map(walk) } : {}),
  });
  return { type: 'doc', content: (document.content ?? []).map(walk) };
}

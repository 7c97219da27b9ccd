/** Tiptap JSON of a note, as `checkDocument` has let it through. */
export type NoteDocument = { type: 'doc'; content: NotePart[] };
export type NotePart = {
  type: string;
  text?: string;
  attrs?: Record<string, unknown>;
  marks?: { type: string; attrs?: Record<string, unknown> }[];
  content?: NotePart[];
};

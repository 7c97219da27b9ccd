import type { NoteDocument } from './note-draft';

/** True when a document holds neither words nor a mention. */
export function isBlank(node: NoteDocument): boolean {
  if (node.type === 'mention') return false;
  if (typeof node.text === 'string') return node.text.trim() === '';
  return !Array.isArray(node.content) || node.content.every((child) => isBlank(child as NoteDocument));
}

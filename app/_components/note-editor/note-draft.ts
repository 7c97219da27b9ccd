import type { PinInput } from '@/lib/review/schemas';
import type { z } from 'zod';
import { isBlank } from './is-blank';
import { deviceStore, type KeyValueStore } from './key-value-store';

export type NoteDocument = Record<string, unknown>;
export type NotePin = z.infer<typeof PinInput>;

/** What someone has begun to write and not sent. */
export interface NoteDraft {
  body: NoteDocument;
  /** Made with the first letter and kept until the note is posted, so that it can only be posted once. */
  clientKey: string;
  mustSettle: boolean;
  pin: NotePin | null;
  savedAt: number;
  /** Why the server refused it, when it came back. */
  refusal: string | null;
}

/** One draft for each person, revision and thread (or place where a thread would begin). */
export function draftKey(personId: string, revisionId: string, subject: string): string {
  return `${personId}:${revisionId}:${subject}`;
}

let store: KeyValueStore | undefined;
const drafts = () => (store ??= deviceStore('firstpull-drafts'));

/** Fired on `window` with the draft's key: it was begun or thrown away, or came back refused. */
export const draftChanged = 'firstpull:draft-changed';
export const draftReturned = 'firstpull:draft-returned';

const tell = (name: string, key: string) => window.dispatchEvent(new CustomEvent(name, { detail: key }));

export const readDraft = (key: string) => drafts().get<NoteDraft>(key);

export async function keepDraft(key: string, draft: NoteDraft): Promise<void> {
  await drafts().set(key, draft);
  tell(draftChanged, key);
}

export async function forgetDraft(key: string): Promise<void> {
  await drafts().delete(key);
  tell(draftChanged, key);
}

/** Puts a refused note back as a draft, where an open editor takes it up. */
export async function returnDraft(key: string, draft: NoteDraft): Promise<void> {
  await keepDraft(key, draft);
  tell(draftReturned, key);
}

/** Keys of this person's drafts on a revision, without those that have no words in them. */
export async function listDrafts(personId: string, revisionId: string): Promise<string[]> {
  const prefix = draftKey(personId, revisionId, '');
  const all = await drafts().entries<NoteDraft>();
  return all.filter(([key, draft]) => key.startsWith(prefix) && !isBlank(draft.body)).map(([key]) => key);
}

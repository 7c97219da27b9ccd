import type { PinInput } from '@/lib/review/schemas';
import type { z } from 'zod';
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

export const readDraft = (key: string) => drafts().get<NoteDraft>(key);
export const keepDraft = (key: string, draft: NoteDraft) => drafts().set(key, draft);
export const forgetDraft = (key: string) => drafts().delete(key);

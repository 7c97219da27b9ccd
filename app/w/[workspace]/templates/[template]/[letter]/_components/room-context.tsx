'use client';

import { createContext, use } from 'react';
import type { Mentionable } from '@/app/_components/note-editor/filter-people';
import type { NotePin } from '@/app/_components/note-editor/note-draft';
import type { Role } from '@/lib/workspaces/roles';
import type { RevisionView } from '@/lib/review/schemas';

export interface RoomReader {
  id: string;
  name: string;
  role: Role;
  /** Has a second factor: signing asks for a code too. */
  asksCode: boolean;
}

export interface RoomValue {
  workspace: { id: string; slug: string; name: string };
  reader: RoomReader;
  revision: RevisionView;
  people: readonly Mentionable[];
  /** Key of the docket item that is looked at. */
  active: string | null;
  /** Looks at an item: marks it, brings the stage to its place. */
  activate: (key: string) => void;
  /** Brings the stage to a place of an item. */
  showPlace: (key: string, at: readonly number[]) => void;
  /** Asks the stage for a place; null when there is no stage to ask (no WebGL, no model yet). */
  askForPin: ((take: (pin: NotePin | null) => void) => void) | null;
  placing: boolean;
  /** Whether the reader has begun to write about a thread's id, `finding-<id>`, or `new`. */
  hasDraft: (subject: string) => boolean;
}

const RoomContext = createContext<RoomValue | null>(null);
export const RoomProvider = RoomContext;

export function useRoom(): RoomValue {
  const room = use(RoomContext);
  if (!room) throw new Error('useRoom needs a RoomProvider above it.');
  return room;
}

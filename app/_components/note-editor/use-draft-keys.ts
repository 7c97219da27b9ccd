'use client';

import { useEffect, useState } from 'react';
import { draftChanged, listDrafts } from './note-draft';

const none: ReadonlySet<string> = new Set();

/** Keys of the drafts that this person has begun on a revision, on this device. */
export function useDraftKeys(personId: string, revisionId: string): ReadonlySet<string> {
  const [keys, setKeys] = useState(none);
  useEffect(() => {
    let current = true;
    const read = () =>
      void listDrafts(personId, revisionId).then((found) => {
        if (current) setKeys((old) => (same(old, found) ? old : new Set(found)));
      });
    read();
    window.addEventListener(draftChanged, read);
    return () => {
      current = false;
      window.removeEventListener(draftChanged, read);
    };
  }, [personId, revisionId]);
  return keys;
}

const same = (old: ReadonlySet<string>, found: readonly string[]) =>
  old.size === found.length && found.every((key) => old.has(key));

'use client';

import { Button } from 'react-aria-components';
import { Menu, MenuItem, MenuTrigger } from '@/app/_components/menu';
import { states } from '@/app/_components/status-word';
import type { RevisionView, Standing } from '@/lib/review/schemas';
import { useRoom } from './room-context';

export const stateKey = (standing: Standing) =>
  standing === 'in_review' ? ('in-review' as const) : standing;

export function letterHref(slug: string, templateId: string, letter: string): string {
  return `/w/${slug}/templates/${templateId}/${letter}`;
}

/** The revision's letter; with siblings, a menu to go to one of them. */
export function RevisionSwitcher({ revision }: { revision: RevisionView }) {
  const { workspace } = useRoom();
  if (revision.siblings.length < 2) return revision.letter;
  return (
    <MenuTrigger>
      <Button
        aria-label={`Revision ${revision.letter}. Go to another revision`}
        className="-mx-1 flex items-center gap-1.5 px-1 font-semibold hover:text-verdigris"
      >
        {revision.letter}
        <svg
          aria-hidden
          viewBox="0 0 10 6"
          className="w-2.5 fill-none stroke-current stroke-[1.5] print:hidden"
        >
          <path d="m1 1 4 4 4-4" />
        </svg>
      </Button>
      <Menu aria-label="Revisions of this template" selectionMode="single" selectedKeys={[revision.id]}>
        {[...revision.siblings].reverse().map((sibling) => (
          <MenuItem
            key={sibling.id}
            id={sibling.id}
            textValue={`Revision ${sibling.letter}`}
            href={letterHref(workspace.slug, revision.template.id, sibling.letter)}
            detail={states[stateKey(sibling.state)].word}
          >
            Revision {sibling.letter}
          </MenuItem>
        ))}
      </Menu>
    </MenuTrigger>
  );
}

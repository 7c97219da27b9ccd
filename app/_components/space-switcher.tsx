'use client';

import NextLink from 'next/link';
import { Button } from 'react-aria-components';
import type { Space } from './app-shell';
import { Menu, MenuItem, MenuSection, MenuTrigger } from './menu';

/** Name of the current studio or workspace; with more than one, a menu to move between them. */
export function SpaceSwitcher({ spaces }: { spaces: readonly Space[] }) {
  const current = spaces.find((space) => space.current);
  if (current && spaces.length === 1) {
    return (
      <NextLink href={current.href} className="py-1 text-slate no-underline hover:text-ink hover:underline">
        {current.name}
      </NextLink>
    );
  }
  const studios = new Set(spaces.map((space) => space.studioName ?? space.name));
  const groups = [
    { title: 'Studios', spaces: spaces.filter((space) => space.kind === 'studio') },
    { title: 'Clients', spaces: spaces.filter((space) => space.kind === 'workspace') },
  ].filter((group) => group.spaces.length > 0);
  return (
    <MenuTrigger>
      <Button className="flex max-w-full items-center gap-1.5 py-1 text-left text-slate hover:text-ink">
        <span className="sr-only">Move to another studio or client. Now in: </span>
        <span className="truncate">{current?.name ?? 'All places'}</span>
        <svg aria-hidden viewBox="0 0 10 6" className="w-2.5 shrink-0 fill-none stroke-current stroke-[1.5]">
          <path d="m1 1 4 4 4-4" />
        </svg>
      </Button>
      <Menu aria-label="Studios and clients">
        {groups.map((group) => (
          <MenuSection
            key={group.title}
            title={group.title}
            selectionMode="single"
            selectedKeys={current ? [current.id] : []}
          >
            {group.spaces.map((space) => (
              <MenuItem
                key={space.id}
                id={space.id}
                href={space.href}
                textValue={space.name}
                detail={[studios.size > 1 && space.kind === 'workspace' ? space.studioName : null, space.role]
                  .filter(Boolean)
                  .join(', ')}
              >
                {space.name}
              </MenuItem>
            ))}
          </MenuSection>
        ))}
      </Menu>
    </MenuTrigger>
  );
}

'use client';

import { Button } from 'react-aria-components';
import { initialsOf } from './initials';
import { Menu, MenuItem, MenuRule, MenuSection, MenuTrigger } from './menu';
import { notify } from './notices';
import { usePreferences } from './preferences-context';
import { signOut } from './sign-out';
import type { Theme } from './preferences';

const themes: readonly { id: Theme; label: string }[] = [
  { id: 'system', label: 'As the system' },
  { id: 'light', label: 'Light' },
  { id: 'dark', label: 'Dark' },
];

/** Account, theme and sign-out of the person who is signed in. */
export function PersonMenu({ person }: { person: { name: string; email: string } }) {
  const { theme, setTheme } = usePreferences();
  function leave() {
    signOut().catch(() =>
      notify('You are still signed in: the server did not answer. Try again.', { kind: 'trouble' }),
    );
  }
  return (
    <MenuTrigger>
      <Button
        aria-label={`You: ${person.name}`}
        className="flex h-8 min-w-8 items-center justify-center border border-ink bg-sheet px-1 font-mono text-xs font-medium hover:bg-sunk pointer-coarse:h-11 pointer-coarse:min-w-11"
      >
        {initialsOf(person.name)}
      </Button>
      <Menu placement="bottom end" aria-label="You">
        <MenuItem id="account" href="/account" textValue="Account" detail={person.email}>
          {person.name}
        </MenuItem>
        <MenuRule />
        <MenuSection
          title="Theme"
          selectionMode="single"
          disallowEmptySelection
          selectedKeys={[theme]}
          onSelectionChange={(keys) => {
            const next = themes.find(({ id }) => keys !== 'all' && keys.has(id));
            if (next) setTheme(next.id);
          }}
        >
          {themes.map(({ id, label }) => (
            <MenuItem key={id} id={id}>
              {label}
            </MenuItem>
          ))}
        </MenuSection>
        <MenuRule />
        <MenuItem id="sign-out" onAction={leave}>
          Sign out
        </MenuItem>
      </Menu>
    </MenuTrigger>
  );
}

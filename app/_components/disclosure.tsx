'use client';

import type { ReactNode } from 'react';
import {
  Button,
  Disclosure as AriaDisclosure,
  DisclosureGroup as AriaDisclosureGroup,
  DisclosurePanel,
  Heading,
} from 'react-aria-components';

export interface DisclosureProps {
  id?: string;
  title: ReactNode;
  defaultExpanded?: boolean;
  level?: 2 | 3 | 4;
  children: ReactNode;
}

/** A part of a page that opens below its heading. */
export function Disclosure({ id, title, defaultExpanded, level = 3, children }: DisclosureProps) {
  return (
    <AriaDisclosure
      id={id}
      defaultExpanded={defaultExpanded}
      className="group/disclosure border-t border-rule"
    >
      <Heading level={level}>
        <Button
          slot="trigger"
          className="flex w-full items-center gap-2 py-2 text-left text-base font-semibold hover:text-verdigris pointer-coarse:py-3"
        >
          <svg
            aria-hidden
            viewBox="0 0 8 10"
            className="w-2 fill-current transition-transform duration-100 group-data-expanded/disclosure:rotate-90"
          >
            <path d="M1 0v10l6-5Z" />
          </svg>
          {title}
        </Button>
      </Heading>
      <DisclosurePanel>
        <div className="pb-4 pl-4">{children}</div>
      </DisclosurePanel>
    </AriaDisclosure>
  );
}

export interface DisclosureGroupProps {
  items: readonly (Omit<DisclosureProps, 'children'> & { id: string; content: ReactNode })[];
  /** Several may be open at once; true by default. */
  allowsMany?: boolean;
}

export function DisclosureGroup({ items, allowsMany = true }: DisclosureGroupProps) {
  const open = items.filter((item) => item.defaultExpanded).map((item) => item.id);
  return (
    <AriaDisclosureGroup
      allowsMultipleExpanded={allowsMany}
      defaultExpandedKeys={open}
      className="border-b border-rule"
    >
      {items.map(({ id, title, level, content }) => (
        <Disclosure key={id} id={id} title={title} level={level}>
          {content}
        </Disclosure>
      ))}
    </AriaDisclosureGroup>
  );
}

'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import { Tab, TabList, TabPanel, Tabs as AriaTabs } from 'react-aria-components';

export interface TabItem {
  id: string;
  label: ReactNode;
  count?: number;
  disabled?: boolean;
  content?: ReactNode;
}

export interface TabsProps {
  label: string;
  tabs: readonly TabItem[];
  selected?: string;
  defaultSelected?: string;
  onChange?: (id: string) => void;
  className?: string;
  panelClassName?: string;
}

/** Views of one thing, underlined in ink. One Tab stop; arrows, Home and End move. */
export function Tabs({
  label,
  tabs,
  selected,
  defaultSelected,
  onChange,
  className,
  panelClassName,
}: TabsProps) {
  return (
    <AriaTabs
      selectedKey={selected}
      defaultSelectedKey={defaultSelected}
      onSelectionChange={(key) => onChange?.(String(key))}
      disabledKeys={tabs.filter((tab) => tab.disabled).map((tab) => tab.id)}
      className={clsx('flex min-w-0 flex-col', className)}
    >
      <TabList aria-label={label} className="flex flex-wrap gap-x-4">
        {tabs.map((tab) => (
          <Tab
            key={tab.id}
            id={tab.id}
            className={clsx(
              'flex cursor-pointer items-center gap-1.5 border-b-2 border-transparent py-1 forced-colors:not-data-selected:border-[Canvas] text-base text-slate pointer-coarse:py-2.5',
              'data-hovered:text-ink data-selected:border-ink data-selected:font-semibold data-selected:text-ink data-disabled:opacity-60',
            )}
          >
            {tab.label}
            {tab.count !== undefined ? <span className="font-mono text-xs">{tab.count}</span> : null}
          </Tab>
        ))}
      </TabList>
      {tabs.map((tab) => (
        <TabPanel key={tab.id} id={tab.id} className={panelClassName ?? 'pt-4'}>
          {tab.content}
        </TabPanel>
      ))}
    </AriaTabs>
  );
}

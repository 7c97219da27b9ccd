'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import {
  Header,
  Menu as AriaMenu,
  MenuItem as AriaMenuItem,
  MenuSection as AriaMenuSection,
  MenuTrigger,
  Popover,
  Separator,
} from 'react-aria-components';
import type {
  MenuItemProps as AriaMenuItemProps,
  MenuProps as AriaMenuProps,
  MenuSectionProps as AriaMenuSectionProps,
} from 'react-aria-components';
import { popoverClass } from './popover';

export interface MenuProps extends AriaMenuProps<object> {
  placement?: 'bottom start' | 'bottom end' | 'top start' | 'top end';
  children: ReactNode;
}

/** A list of actions or places; goes inside `<MenuTrigger>` after a Button. */
export function Menu({ placement = 'bottom start', className, ...rest }: MenuProps) {
  return (
    <Popover placement={placement} className={popoverClass}>
      <AriaMenu
        {...rest}
        className={clsx('min-w-52 max-h-[70dvh] overflow-auto py-1 outline-none', className)}
      />
    </Popover>
  );
}

export interface MenuItemProps extends Omit<AriaMenuItemProps, 'children' | 'className'> {
  children: ReactNode;
  /** A second, quieter line. */
  detail?: ReactNode;
  isDanger?: boolean;
}

export function MenuItem({ children, detail, isDanger, ...rest }: MenuItemProps) {
  return (
    <AriaMenuItem
      textValue={typeof children === 'string' ? children : undefined}
      {...rest}
      className={clsx(
        'flex cursor-pointer items-start gap-2 px-3 py-1.5 text-base no-underline outline-offset-[-2px] pointer-coarse:py-3',
        'data-focused:bg-verdigris-wash data-disabled:text-slate',
        isDanger ? 'text-madder' : 'text-ink',
      )}
    >
      {({ selectionMode, isSelected }) => (
        <>
          {selectionMode !== 'none' ? (
            <span aria-hidden className="w-3.5 shrink-0 text-verdigris">
              {isSelected ? '✓' : ''}
            </span>
          ) : null}
          <span className="min-w-0">
            {children}
            {detail ? <span className="block text-sm text-slate">{detail}</span> : null}
          </span>
        </>
      )}
    </AriaMenuItem>
  );
}

export interface MenuSectionProps extends Omit<AriaMenuSectionProps<object>, 'children'> {
  title: string;
  children: ReactNode;
}

export function MenuSection({ title, children, ...rest }: MenuSectionProps) {
  return (
    <AriaMenuSection {...rest}>
      <Header className="px-3 pt-2 pb-1 font-mono text-label text-slate uppercase">{title}</Header>
      {children}
    </AriaMenuSection>
  );
}

export function MenuRule() {
  return <Separator className="my-1 border-t border-rule" />;
}

export { MenuTrigger };

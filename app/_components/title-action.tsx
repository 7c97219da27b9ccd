'use client';

import NextLink from 'next/link';
import type { ReactNode } from 'react';
import { Button } from 'react-aria-components';

export interface TitleActionProps {
  label: ReactNode;
  /** What the step does, in four or five words. */
  detail?: ReactNode;
  /** Goes somewhere … */
  href?: string;
  /** … where `href` is a file and not a page, so that nothing fetches it ahead, … */
  isFile?: boolean;
  /** … or does something here. Also works as the trigger inside `<DialogTrigger>`. */
  onPress?: () => void;
  isDisabled?: boolean;
}

const actionClass =
  'flex min-h-14 w-full flex-col items-start justify-center bg-verdigris px-4 py-2 text-left text-on-verdigris no-underline outline-offset-[-4px] outline-on-verdigris! hover:bg-verdigris-deep data-disabled:bg-sunk data-disabled:text-slate';

/** The verdigris end of a title block. */
export function TitleAction({ label, detail, href, isFile, onPress, isDisabled }: TitleActionProps) {
  const content = (
    <>
      <span className="text-md font-semibold">{label}</span>
      {detail ? <span className="text-xs">{detail}</span> : null}
    </>
  );
  if (href && isFile) {
    return (
      <a href={href} className={actionClass}>
        {content}
      </a>
    );
  }
  if (href) {
    return (
      <NextLink href={href} className={actionClass}>
        {content}
      </NextLink>
    );
  }
  return (
    <Button onPress={onPress} isDisabled={isDisabled} className={actionClass}>
      {content}
    </Button>
  );
}

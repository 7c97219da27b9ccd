import clsx from 'clsx';
import NextLink from 'next/link';
import type { ComponentProps } from 'react';
import { buttonClass, type ButtonSize, type ButtonVariant } from './button-class';

type NextLinkProps = ComponentProps<typeof NextLink>;

const linkClass =
  'text-verdigris underline decoration-verdigris/50 decoration-1 underline-offset-3 hover:decoration-current hover:decoration-2';

/** A link in running text: verdigris and underlined. Works in server and client components. */
export function Link({ className, ...rest }: NextLinkProps) {
  return <NextLink {...rest} className={clsx(linkClass, className)} />;
}

/** A link that carries the main step of a page and looks like a button. */
export function ButtonLink(props: NextLinkProps & { variant?: ButtonVariant; size?: ButtonSize }) {
  const { variant, size, className, ...rest } = props;
  return <NextLink {...rest} className={buttonClass(variant, size, className)} />;
}

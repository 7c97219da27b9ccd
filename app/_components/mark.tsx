import clsx from 'clsx';
import NextLink from 'next/link';

/** The mark: a template in ink with the sheet drawn down over it. */
export function Mark({ className }: { className?: string }) {
  return (
    <svg aria-hidden viewBox="0 0 32 24" className={clsx('fill-none', className)}>
      <path
        d="M9.2 20.5 12.4 8.6a1 1 0 0 1 .95-.73h5.3a1 1 0 0 1 .95.73l3.2 11.9"
        className="stroke-ink"
        strokeWidth="1.8"
      />
      <path
        d="M1 20.5h3.6c.75 0 1.4-.5 1.58-1.22L9.5 6.2A2.9 2.9 0 0 1 12.3 4h7.4a2.9 2.9 0 0 1 2.8 2.2l3.32 13.08c.19.72.83 1.22 1.58 1.22H31"
        className="stroke-verdigris"
        strokeWidth="2.2"
      />
    </svg>
  );
}

/** Mark and name, linked to the reader's start page. */
export function Wordmark({ href = '/today', className }: { href?: string; className?: string }) {
  return (
    <NextLink href={href} className={clsx('inline-flex items-center gap-2 text-ink no-underline', className)}>
      <Mark className="h-5.5 w-auto" />
      <span className="text-lg font-bold">Firstpull</span>
    </NextLink>
  );
}

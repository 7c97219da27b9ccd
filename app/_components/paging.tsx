import { ButtonLink } from './link';

export interface PagingProps {
  /** What is shown, such as `26 to 50 of 131 templates`. */
  text: string;
  previousHref?: string | null;
  nextHref?: string | null;
  /** Name of the list, for screen readers. */
  label: string;
}

/** Previous and next page of a list that the server pages. */
export function Paging({ text, previousHref, nextHref, label }: PagingProps) {
  return (
    <nav aria-label={`Pages of ${label}`} className="flex flex-wrap items-center justify-between gap-3 py-3">
      <p className="text-sm text-slate tabular-nums">{text}</p>
      <div className="flex gap-2">
        {previousHref ? (
          <ButtonLink href={previousHref} rel="prev" size="small">
            Previous
          </ButtonLink>
        ) : null}
        {nextHref ? (
          <ButtonLink href={nextHref} rel="next" size="small">
            Next
          </ButtonLink>
        ) : null}
      </div>
    </nav>
  );
}

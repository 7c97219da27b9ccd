import clsx from 'clsx';
import type { ReactNode } from 'react';

export interface TitleField {
  label: string;
  value: ReactNode;
  /** `large` for the number, title and revision letter; `mono` for digests and codes. */
  style?: 'large' | 'mono';
  /** Share of spare width; 1 by default. */
  grow?: number;
}

export interface TitleBlockProps {
  fields: readonly TitleField[];
  /** The one main step, filling the block's right end: give a `TitleAction`. */
  action?: ReactNode;
  /** A gate line, ruled below the fields in the same frame. */
  children?: ReactNode;
}

/** Identity of a document in a ruled frame, with the kind of fields that ISO 7200 names. */
export function TitleBlock({ fields, action, children }: TitleBlockProps) {
  return (
    <div className="border border-ink bg-sheet">
      <div className="flex flex-col lg:flex-row">
        <dl className="flex grow flex-wrap gap-px overflow-hidden bg-rule">
          {fields.map((field) => (
            <div
              key={field.label}
              className="min-w-fit basis-auto bg-sheet px-3 pt-1.5 pb-2.5 max-sm:max-w-full max-sm:min-w-[42%]"
              style={{ flexGrow: field.grow ?? 1 }}
            >
              <dt className="font-mono text-label text-slate uppercase">{field.label}</dt>
              <dd
                className={clsx(
                  field.style === 'large' ? 'text-xl leading-7 font-semibold' : 'text-base font-medium',
                  field.style === 'mono' && 'font-mono text-sm leading-6',
                )}
              >
                {field.value}
              </dd>
            </div>
          ))}
        </dl>
        {action ? (
          <div className="flex border-t border-ink print:hidden lg:min-w-48 lg:border-t-0 lg:border-l">
            {action}
          </div>
        ) : null}
      </div>
      {children ? <div className="border-t border-ink">{children}</div> : null}
    </div>
  );
}

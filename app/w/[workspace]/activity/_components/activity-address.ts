import type { ListActivityInput } from '@/lib/review/schemas';

export type ActivityState = Pick<ListActivityInput, 'about' | 'by'>;

/** Address of the record narrowed so, at its newest entry or after a cursor. */
export function activityAddress(home: string, { about, by }: ActivityState, cursor?: string): string {
  const search = new URLSearchParams(
    Object.entries({ about, by, cursor }).filter((part): part is [string, string] => Boolean(part[1])),
  ).toString();
  return search ? `${home}?${search}` : home;
}

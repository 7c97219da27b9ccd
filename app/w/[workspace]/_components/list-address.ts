export type ListState = {
  search: string;
  standing?: string;
  sort: 'changed' | 'number' | 'title' | 'due';
  direction: 'asc' | 'desc';
  cursor?: string;
};

/** Address of the list in another state; what is at its default stays out of it, and so does the page. */
export function listAddress(home: string, state: ListState, change: Partial<ListState>): string {
  const next = { ...state, cursor: undefined, ...change };
  const query = new URLSearchParams();
  if (next.search) query.set('search', next.search);
  if (next.standing) query.set('standing', next.standing);
  if (next.sort !== 'changed') query.set('sort', next.sort);
  if (next.direction !== (next.sort === 'changed' ? 'desc' : 'asc')) query.set('direction', next.direction);
  if (next.cursor) query.set('cursor', next.cursor);
  const text = query.toString();
  return text ? `${home}?${text}` : home;
}

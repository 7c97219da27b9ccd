import type { DocketView, FindingView, ThreadView } from '@/lib/review/schemas';

/** Where an item stands in the docket; `after` is for what was said once the revision was agreed. */
export type DocketGroup = 'settle' | 'look' | 'settled' | 'fine' | 'unchecked' | 'after';

/** A finding with the thread that answers it, or a thread of its own. */
export interface DocketItem {
  /** Also the id of its element, and `?item=` in the address. */
  key: string;
  finding: FindingView | null;
  thread: ThreadView | null;
  group: DocketGroup;
}

const severity: Record<FindingView['status'], number> = { fail: 0, caution: 1, 'not-run': 2, pass: 3 };

function groupOf(finding: FindingView | null, thread: ThreadView | null): DocketGroup {
  const open = thread?.state === 'open';
  if (!finding) {
    if (thread?.afterApproval) return 'after';
    if (!open) return 'settled';
    return thread?.mustSettle ? 'settle' : 'look';
  }
  if (finding.status === 'fail' && !finding.waiver) return 'settle';
  if (open && !thread.afterApproval) return thread.mustSettle ? 'settle' : 'look';
  if (finding.status === 'fail') return 'settled';
  if (finding.status === 'caution') return thread && !open ? 'settled' : 'look';
  return finding.status === 'pass' ? 'fine' : 'unchecked';
}

/** The docket as one list: findings (failing ones first) and the threads that stand by themselves. */
export function docketItems(docket: DocketView): DocketItem[] {
  const answers = new Map<string, ThreadView>();
  for (const thread of docket.threads) {
    if (thread.findingId && !thread.afterApproval) answers.set(thread.findingId, thread);
  }
  const findings = docket.findings
    .map((finding) => {
      const thread = answers.get(finding.id) ?? null;
      return { key: `finding-${finding.id}`, finding, thread, group: groupOf(finding, thread) };
    })
    .sort((a, b) => severity[a.finding.status] - severity[b.finding.status]);
  const known = new Set(docket.findings.map((finding) => finding.id));
  const threads = docket.threads
    .filter((t) => !t.findingId || !known.has(t.findingId) || answers.get(t.findingId) !== t)
    .map((thread) => ({ key: `thread-${thread.id}`, finding: null, thread, group: groupOf(null, thread) }));
  return [...findings, ...threads];
}

export type ItemKind = 'all' | 'findings' | 'notes' | 'mine';

export interface DocketFilter {
  /** Words, all of which must occur. */
  search: string;
  kind: ItemKind;
}

/** Whether somebody wrote in the thread or is mentioned in it. */
function concerns(thread: ThreadView | null, personId: string): boolean {
  return Boolean(thread?.notes.some((note) => note.authorId === personId || mentions(note.body, personId)));
}

function mentions(node: unknown, personId: string): boolean {
  if (typeof node !== 'object' || node === null) return false;
  const { type, attrs, content } = node as {
    type?: unknown;
    attrs?: { id?: unknown };
    content?: unknown;
  };
  if (type === 'mention' && attrs?.id === personId) return true;
  return Array.isArray(content) && content.some((child) => mentions(child, personId));
}

function wordsOf({ finding, thread }: DocketItem): string {
  return [
    finding?.checkId,
    finding?.message,
    finding?.remedy,
    finding?.waiver?.reason,
    ...(thread?.notes.flatMap((note) => [note.authorName, note.text]) ?? []),
  ]
    .filter(Boolean)
    .join(' ')
    .toLowerCase();
}

/** The items that a filter leaves, in their order. */
export function filterItems(
  items: readonly DocketItem[],
  filter: DocketFilter,
  personId: string,
): DocketItem[] {
  const wanted = filter.search.toLowerCase().split(/\s+/).filter(Boolean);
  return items.filter((item) => {
    if (filter.kind === 'findings' && !item.finding) return false;
    if (filter.kind === 'notes' && !item.thread) return false;
    if (filter.kind === 'mine' && !concerns(item.thread, personId)) return false;
    const words = wanted.length > 0 ? wordsOf(item) : '';
    return wanted.every((word) => words.includes(word));
  });
}

/** Order of the groups on the page. */
export const groupOrder: readonly DocketGroup[] = ['settle', 'look', 'after', 'settled', 'fine', 'unchecked'];

export function byGroup(items: readonly DocketItem[]): Record<DocketGroup, DocketItem[]> {
  const groups: Record<DocketGroup, DocketItem[]> = {
    settle: [],
    look: [],
    settled: [],
    fine: [],
    unchecked: [],
    after: [],
  };
  for (const item of items) groups[item.group].push(item);
  return groups;
}

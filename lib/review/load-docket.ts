import type { TenantTx } from '@/db/tenant';
import { findRevision } from './revision-data';
import { checksOfFindings, findingsOf, type FindingRow } from './check-data';
import {
  findThread,
  newestPlacement,
  notesOf,
  threadsOn,
  waiversOf,
  type NoteRow,
  type PlacementRow,
  type ThreadRow,
  type WaiverRow,
} from './docket-data';

export type DocketThread = {
  thread: ThreadRow;
  placement: PlacementRow;
  openedOn: string;
  notes: NoteRow[];
  /** The finding of this revision that the thread answers; for a carried one, the same check's finding. */
  findingId: string | null;
};
export type Docket = { findings: FindingRow[]; waivers: WaiverRow[]; threads: DocketThread[] };

/** Everything that stands on a revision, in a number of statements that does not grow with it. */
export async function loadDocket(tx: TenantTx, workspaceId: string, revisionId: string): Promise<Docket> {
  const findings = await findingsOf(tx, workspaceId, revisionId);
  const waivers = await waiversOf(tx, workspaceId, revisionId);
  const placed = await threadsOn(tx, workspaceId, revisionId);
  const chains = placed.map(({ thread }) => [...thread.continues, thread.id]);
  const notes = new Map<string, NoteRow[]>();
  for (const note of await notesOf(tx, workspaceId, chains.flat()))
    notes.set(note.threadId, [...(notes.get(note.threadId) ?? []), note]);
  const own = new Set(findings.map((finding) => finding.id));
  const foreign = placed
    .map(({ thread }) => thread.findingId)
    .filter((id): id is string => id !== null && !own.has(id));
  const checkOf = await checksOfFindings(tx, workspaceId, foreign);
  const here = new Map(findings.map((finding) => [finding.checkId, finding.id]));
  const threads = placed.map(({ thread, placement, openedOn }, i) => {
    const about = thread.findingId;
    const findingId = about && !own.has(about) ? (here.get(checkOf.get(about) ?? '') ?? null) : about;
    return { thread, placement, openedOn, findingId, notes: chains[i].flatMap((id) => notes.get(id) ?? []) };
  });
  return { findings, waivers, threads };
}

/** One thread where it is being talked about: on the newest revision that it stands on. */
export async function loadThread(tx: TenantTx, workspaceId: string, threadId: string): Promise<DocketThread> {
  const thread = await findThread(tx, workspaceId, threadId);
  const placement = await newestPlacement(tx, workspaceId, threadId);
  const { letter } = await findRevision(tx, workspaceId, thread.revisionId);
  const said = await notesOf(tx, workspaceId, [...thread.continues, thread.id]);
  return { thread, placement, openedOn: letter, findingId: thread.findingId, notes: said };
}

import type { TenantTx } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import { findCheckRun, findReportDigest } from './check-data';
import { loadDocket, type Docket } from './load-docket';
import { loadRevisionParts, type RevisionRow } from './revision-data';

/** What of the docket is signed: every finding with its waiver, every thread with its state and a digest of its notes. */
export type DocketSummary = {
  findings: { checkId: string; status: string; waived: string | null }[];
  threads: { id: string; mustSettle: boolean; state: string; notes: number; notesDigest: string }[];
  digest: string;
};

/** The content of a revision as it is signed and locked; its digest is SHA-256 over its RFC 8785 form. */
export type Content = {
  schema: 1;
  workspace: string;
  template: { id: string; number: string; title: string; dueOn: string | null };
  revision: { id: string; letter: string };
  mesh: { sha256: string; bytes: number; fileName: string };
  recipe: Record<string, unknown>;
  recipeDigest: string;
  report: { sha256: string; engineVersion: string };
  docket: DocketSummary;
  gatePlan: { number: number };
};

/** Threads opened after the approval are outside what was agreed. Order: findings as reported, threads by id. */
export function summariseDocket(docket: Docket): DocketSummary {
  const waivers = new Map(docket.waivers.map((waiver) => [waiver.findingId, waiver.reason]));
  const findings = docket.findings.map((finding) => ({
    checkId: finding.checkId,
    status: finding.status,
    waived: waivers.get(finding.id) ?? null,
  }));
  const threads = docket.threads
    .filter(({ thread }) => !thread.afterApproval)
    .map(({ thread, notes }) => ({
      id: thread.id,
      mustSettle: thread.mustSettle,
      state: thread.state,
      notes: notes.length,
      notesDigest: digestOf(notes.map((note) => ({ id: note.id, authorId: note.authorId, body: note.body }))),
    }))
    .sort((a, b) => (a.id < b.id ? -1 : 1));
  return { findings, threads, digest: digestOf({ findings, threads }) };
}

/**
 * The content as it stands in this transaction; null until the check has finished. `locked` is what was agreed
 * already: a template may be renamed for its next revision, so title and due date are then those of the lock.
 */
export async function composeContent(
  tx: TenantTx,
  revision: RevisionRow,
  { docket: given, locked }: { docket?: Docket; locked?: Content } = {},
): Promise<{ content: Content; digest: string; docket: Docket } | null> {
  const { workspaceId } = revision;
  const run = await findCheckRun(tx, workspaceId, revision.id);
  if (run?.state !== 'finished' || !run.reportId) return null;
  const report = await findReportDigest(tx, workspaceId, run.reportId);
  if (!report) return null;
  const { template, mesh, recipe, gatePlanNumber } = await loadRevisionParts(tx, revision);
  const docket = given ?? (await loadDocket(tx, workspaceId, revision.id));
  const content: Content = {
    schema: 1,
    workspace: workspaceId,
    template: {
      id: template.id,
      number: template.number,
      title: (locked?.template ?? template).title,
      dueOn: (locked?.template ?? template).dueOn,
    },
    revision: { id: revision.id, letter: revision.letter },
    mesh: { sha256: mesh.sha256, bytes: mesh.bytes, fileName: mesh.fileName },
    recipe: recipe.body,
    recipeDigest: recipe.digest,
    report,
    docket: summariseDocket(docket),
    gatePlan: { number: gatePlanNumber },
  };
  return { content, digest: digestOf(content), docket };
}

import type { TenantTx } from '@/db/tenant';
import { findCheckRun, findReportById } from '@/lib/review/check-data';
import { composeContent, type Content } from '@/lib/review/content';
import { frozenRecord } from '@/lib/review/frozen-record';
import { viewDocketRows } from '@/lib/review/docket-view';
import {
  findLock,
  gatesOf,
  newestGatePlan,
  signaturesOf,
  type GateRow,
  type SignatureRow,
} from '@/lib/review/gate-data';
import { loadDocket, type Docket } from '@/lib/review/load-docket';
import { loadRevisionParts, type RevisionRow } from '@/lib/review/revision-data';
import { makersOf } from '@/lib/review/who-signs';
import type { Report } from '@/lib/formability/report';
import { digestOf } from './canonical';
import { releaseFaults, stateFaults } from './life-faults';
import { sameJson } from './same-json';
import { signatureFaults } from './signature-faults';
import type { AuditRow } from './data';
import { entriesAbout, releaseWithPack } from './verify-data';

export type StoredObject = { what: string; key: string; bytes: number; sha256: string };
export type RevisionFinding = { faults: string[]; objects: StoredObject[] };

/**
 * Holds everything that is stored of a locked revision against what was signed and against the audit chain.
 * The chain must have been verified before: its entries are the witness here.
 */
export async function verifyRevision(tx: TenantTx, revision: RevisionRow): Promise<RevisionFinding> {
  const { workspaceId, id } = revision;
  const faults: string[] = [];
  const must = (holds: boolean, fault: string) => {
    if (!holds) faults.push(fault);
  };
  const lock = await findLock(tx, workspaceId, id);
  if (!lock) return { faults: ['its lock is missing'], objects: [] };
  const { mesh, recipe } = await loadRevisionParts(tx, revision);
  const run = await findCheckRun(tx, workspaceId, id);
  const report = run?.reportId ? await findReportById(tx, workspaceId, run.reportId) : null;
  const docket = agreedDocket(await loadDocket(tx, workspaceId, id));
  const found = await releaseWithPack(tx, workspaceId, id);
  const about = [id, ...(found ? [found.release.id] : [])];
  const entries = await entriesAbout(tx, workspaceId, about);
  const entry = (action: string) => entries.find((one) => one.action === action);

  must(digestOf(lock.content) === lock.contentDigest, 'the locked content does not have the signed digest');
  must(
    entry('revision.locked')?.detail.contentDigest === lock.contentDigest,
    'the digest is not the one that the audit chain has for the lock',
  );
  const witness = entry('revision.locked')?.detail.record as { schema?: unknown } | undefined;
  must(
    sameJson(witness, await frozenRecord(tx, revision, witness?.schema === 1 ? 1 : 2)),
    'the record of the revision is not, field by field, what it was when it was locked',
  );
  must(digestOf(recipe.body) === recipe.digest, 'the recipe does not have its digest');
  must(!!report && digestOf(report.body) === report.sha256, 'the report does not have its digest');
  const now = await composeContent(tx, revision, { locked: lock.content as Content });
  must(
    now?.digest === lock.contentDigest,
    `what is stored is not what was signed: ${now ? differences(lock.content as Content, now.content) : 'the check run is missing'}`,
  );
  must(
    sameJson(viewDocketRows(id, docket), lock.docket),
    'the docket is not as it was when the revision was locked',
  );
  if (report) {
    const body = report.body as unknown as Report;
    must(sameFindings(docket, body), 'the findings are not those of the report');
    must(
      body.input.sha256 === mesh.sha256 &&
        body.input.bytes === mesh.bytes &&
        body.input.triangles === mesh.triangles &&
        body.input.format === mesh.format,
      'the mesh’s record is not that of the file which the report was made of',
    );
    must(worstOf(body) === run?.verdict, 'the verdict is not that of the report');
  }
  const signed = await signaturesOf(tx, workspaceId, id);
  faults.push(...signatureFaults(signed, entries, lock.content as Content, lock.contentDigest));
  faults.push(...(await gateFaults(tx, revision, makersOf(revision, mesh), signed, entries)));
  faults.push(...stateFaults(revision, entries));
  faults.push(...releaseFaults(found, entries));

  const objects = [
    { what: `mesh ${mesh.fileName}`, key: mesh.storeKey, bytes: mesh.bytes, sha256: mesh.sha256 },
  ];
  if (found?.pack) {
    const { fileName, storeKey, bytes, sha256 } = found.pack;
    objects.push({ what: `pack ${fileName}`, key: storeKey, bytes, sha256 });
  }
  return { faults, objects };
}

/** Threads opened after the approval are outside what was agreed. */
const agreedDocket = (docket: Docket): Docket => ({
  ...docket,
  threads: docket.threads.filter(({ thread }) => !thread.afterApproval),
});

const differences = (locked: Content, now: Content): string =>
  (Object.keys(now) as (keyof Content)[]).filter((key) => !sameJson(locked[key], now[key])).join(', ');

function sameFindings({ findings }: Docket, { checks }: Report): boolean {
  const said = ({
    status,
    measured,
    limit,
    unit,
    message,
    remedy,
    basis,
    places,
  }: Report['checks'][number]) => ({
    status,
    measured,
    limit,
    unit,
    message,
    remedy,
    basis,
    places,
  });
  return (
    findings.length === checks.length &&
    checks.every((check, index) => {
      const row = findings[index];
      return row.checkId === check.id && sameJson(said(row as never), said(check));
    })
  );
}

function worstOf({ checks }: Report): string {
  const has = (status: string) => checks.some((check) => check.status === status);
  return has('fail') ? 'fail' : has('caution') ? 'caution' : 'pass';
}

/** Each gate passed, under its plan's own rule, with as many different signers as it asks for. */
async function gateFaults(
  tx: TenantTx,
  revision: RevisionRow,
  makers: string[],
  signed: SignatureRow[],
  entries: AuditRow[],
): Promise<string[]> {
  const gates = await gatesOf(tx, revision.workspaceId, revision.id);
  const faults: string[] = [];
  if (gates.length === 0 && (await newestGatePlan(tx, revision.workspaceId)))
    faults.push('its gates are missing');
  for (const gate of gates) {
    if (gate.state !== 'passed') faults.push(`the gate ${gate.rule.name} has not passed`);
    const signers = signed.filter(
      ({ gateId, decision, signerId }) =>
        gateId === gate.id && decision === 'sign' && !(gate.rule.fourEyes && makers.includes(signerId)),
    );
    if (!enough(gate, signers, entries))
      faults.push(`the gate ${gate.rule.name} has fewer signatures than it asks for`);
  }
  return faults;
}

/** Where everybody has to sign, the chain says who that was when the gate passed. */
function enough({ id, rule }: GateRow, signers: SignatureRow[], entries: AuditRow[]): boolean {
  if (rule.quorum !== 'all') return new Set(signers.map(({ signerId }) => signerId)).size >= rule.quorum;
  const passed = entries.find(({ action, detail }) => action === 'gate.passed' && detail.gateId === id);
  const asked = (passed?.detail.asked ?? []) as { id: string }[];
  const answered = new Set(signers.flatMap(({ signerId, signedForId }) => [signerId, signedForId]));
  return passed !== undefined && signers.length > 0 && asked.every((person) => answered.has(person.id));
}

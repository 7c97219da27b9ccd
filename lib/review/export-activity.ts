import { Readable } from 'node:stream';
import { withTenant } from '@/db/tenant';
import { entriesAfter, readHead, type AuditRow } from '@/lib/audit/data';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { templateNumbers } from './activity-data';
import { tell, templateOf } from './activity-words';
import type { ExportActivityInput } from './schemas';

export type ActivityFile = { fileName: string; type: string; body: ReadableStream<Uint8Array> };

const pageSize = 500;

/**
 * The whole record of the workspace as a file, oldest entry first, up to the entry that is newest now: `csv` in
 * plain words, `json` with every field that the hashes are made of. It is read while it is sent.
 */
export async function exportActivity(
  ctx: WorkspaceContext,
  { format }: ExportActivityInput,
): Promise<ActivityFile> {
  requirePermission(ctx, 'activity.read');
  const head = await withTenant(ctx, (tx) => readHead(tx, ctx.workspace.id));
  const last = head?.seq ?? 0;
  const parts = format === 'csv' ? csvParts(ctx, last) : jsonParts(ctx, last, head?.hash ?? null);
  return {
    fileName: `${ctx.workspace.slug}-activity-to-${last}.${format}`,
    type: format === 'csv' ? 'text/csv; charset=utf-8; header=present' : 'application/json',
    body: Readable.toWeb(Readable.from(parts, { objectMode: false })) as ReadableStream<Uint8Array>,
  };
}

type Page = { rows: AuditRow[]; numbers: Map<string, string> };

async function* pages(ctx: WorkspaceContext, last: number): AsyncGenerator<Page> {
  const workspaceId = ctx.workspace.id;
  for (let seq = 0; seq < last;) {
    const page = await withTenant(ctx, async (tx) => {
      const rows = await entriesAfter(tx, workspaceId, seq, Math.min(pageSize, last - seq));
      const ids = [...new Set(rows.flatMap((row) => templateOf(row) ?? []))];
      return { rows, numbers: await templateNumbers(tx, workspaceId, ids) };
    });
    if (page.rows.length === 0) return;
    seq = page.rows[page.rows.length - 1].seq;
    yield page;
  }
}

async function* csvParts(ctx: WorkspaceContext, last: number): AsyncGenerator<string> {
  yield csvLine(['entry', 'time (UTC)', 'who', 'what', 'action', 'hash']);
  for await (const { rows, numbers } of pages(ctx, last))
    yield rows
      .map((row) => {
        const number = numbers.get(templateOf(row) ?? '') ?? 'a template';
        const { text } = tell(row, { slug: ctx.workspace.slug, number });
        return csvLine([String(row.seq), row.at.toISOString(), row.actorName, text, row.action, row.hash]);
      })
      .join('');
}

/** One line after RFC 4180. What a spreadsheet would take for a formula is kept as text by an apostrophe. */
export function csvLine(cells: string[]): string {
  const safe = cells.map((cell) => (/^[=+\-@\t\r＝＋－＠]/.test(cell) ? `'${cell}` : cell));
  return `${safe.map((cell) => (/[",\r\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell)).join(',')}\r\n`;
}

const rule =
  'hash = SHA-256(0x00, previous as bytes, RFC 8785 text of the entry without "previous" and "hash", with the workspace’s id as "workspaceId"); the first previous is 64 zeros';

async function* jsonParts(ctx: WorkspaceContext, last: number, hash: string | null): AsyncGenerator<string> {
  const { id, name } = ctx.workspace;
  const opening = JSON.stringify({ schema: 1, workspace: { id, name }, rule, head: { seq: last, hash } });
  yield `${opening.slice(0, -1)},"entries":[`;
  let first = true;
  for await (const { rows } of pages(ctx, last))
    for (const { workspaceId: _workspace, ...entry } of rows) {
      yield `${first ? '' : ','}\n${JSON.stringify(entry)}`;
      first = false;
    }
  yield '\n]}\n';
}

import { checkName } from '@/lib/review/check-words';
import type { ContentView } from '@/lib/review/schemas';

/** What is different between the content a signer was shown and the content as it stands, in sentences. */
export function contentChanges(shown: ContentView, now: ContentView): string[] {
  if (shown.digest === now.digest) return [];
  const changes: string[] = [];
  const before = new Map(shown.summary.findings.map((finding) => [finding.checkId, finding]));
  for (const finding of now.summary.findings) {
    const old = before.get(finding.checkId);
    if (finding.waived && !old?.waived) {
      changes.push(
        `The finding on ${checkName(finding.checkId).toLowerCase()} was waived: “${finding.waived}”.`,
      );
    } else if (old && old.status !== finding.status) {
      changes.push(`The finding on ${checkName(finding.checkId).toLowerCase()} is now another one.`);
    }
  }
  const open = new Set(now.summary.openItems);
  const wasOpen = new Set(shown.summary.openItems);
  for (const item of open) if (!wasOpen.has(item)) changes.push(`A new open item: ${item}`);
  for (const item of wasOpen) if (!open.has(item)) changes.push(`No longer open: ${item}`);
  if (shown.summary.meshSha256 !== now.summary.meshSha256) changes.push('The mesh is another file.');
  if (changes.length === 0) changes.push('Something was said or settled in the docket.');
  return changes;
}

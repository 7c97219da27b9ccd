import { analyse } from '@/lib/formability/analyse';
import { analyseFile } from '@/lib/formability/analyse-file';
import { isStep } from '@/lib/formability/parse/sniff-format';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { mutatedFile } from '../../fixtures/meshes/mutate';

/** Runs the cases that its parent names, one after another, and tells how each ended. */
process.on('message', (index: number) => {
  void judge(index).then((outcome) =>
    process.send?.({ index, ...outcome, rssMB: process.memoryUsage().rss / 1e6 }),
  );
});

async function judge(index: number): Promise<{ outcome: string; why?: string; format: string }> {
  const { bytes, format } = mutatedFile(index);
  try {
    const run = isStep(bytes) ? analyseFile : analyse;
    const { report } = await run(bytes, { grid: { cellMm: 2 } }, { geometryOnly: index % 20 !== 0 });
    const bad = JSON.stringify(report, (_key, value: unknown) => (typeof value === 'number' && !Number.isFinite(value) ? 'NOT-FINITE' : value)); // prettier-ignore
    if (bad.includes('NOT-FINITE')) return { outcome: 'fault', why: 'a figure is not finite', format };
    return { outcome: 'report', format };
  } catch (error) {
    if (!(error instanceof UnusableInput)) return { outcome: 'fault', why: String((error as Error)?.stack ?? error), format }; // prettier-ignore
    if (/\n/.test(error.message) || error.message.length < 20) return { outcome: 'fault', why: `message: ${error.message}`, format }; // prettier-ignore
    return { outcome: error.code, format };
  }
}

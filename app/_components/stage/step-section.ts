import type { SectionLine } from '@/lib/stage-model/section';

/**
 * The cutting line after a key, or null for any other key: arrows 1 mm (Shift 10 mm), Page keys a tenth of the way,
 * Home and End to the ends. Positions are kept to 0.1 mm and inside the template.
 */
export function stepSection(
  line: SectionLine,
  { key, shiftKey }: { key: string; shiftKey: boolean },
  low: number,
  high: number,
): SectionLine | null {
  const step = shiftKey ? 10 : 1;
  const page = (high - low) / 10;
  const moved: Record<string, number> = {
    ArrowUp: line.atMm + step,
    ArrowRight: line.atMm + step,
    ArrowDown: line.atMm - step,
    ArrowLeft: line.atMm - step,
    PageUp: line.atMm + page,
    PageDown: line.atMm - page,
    Home: low,
    End: high,
  };
  if (!(key in moved)) return null;
  const atMm = Math.round(Math.min(high, Math.max(low, moved[key])) * 10) / 10;
  return { ...line, atMm };
}

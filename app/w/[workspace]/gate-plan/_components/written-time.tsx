import { formatDay, formatMoment } from '@/app/_components/format-time';
import { readPreferences } from '@/app/_components/read-preferences';

/**
 * When a version was made, in the reader's zone. Written by the server: it does not tick, and this page, which phones
 * open to sign, is kept light.
 */
export async function WrittenTime({ at, show, zone }: { at: string; show: 'moment' | 'day'; zone: string }) {
  const own = (await readPreferences()).zone ?? zone;
  const date = new Date(at);
  return (
    <time dateTime={at} title={own}>
      {show === 'day' ? formatDay(date, own) : formatMoment(date, own)}
    </time>
  );
}

import clsx from 'clsx';

/** Splits a hex digest into groups of four, so that two can be compared by eye. */
export function groupHex(hex: string, characters = hex.length): string {
  return (hex.slice(0, characters).match(/.{1,4}/g) ?? []).join(' ');
}

/** A content digest: the first `characters` (12 by default) with the rest in the tooltip, or all of it. */
export function Digest(props: { value: string; characters?: number | 'all'; className?: string }) {
  const { value, characters = 12, className } = props;
  const shown = characters === 'all' ? value.length : characters;
  return (
    <code title={value} className={clsx('font-mono', shown <= 16 && 'whitespace-nowrap', className)}>
      {groupHex(value, shown)}
      {shown < value.length ? '\u00a0…' : ''}
    </code>
  );
}

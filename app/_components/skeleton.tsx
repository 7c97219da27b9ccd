import clsx from 'clsx';

/** Grey lines in the place of text that is on its way; `label` is what a screen reader hears. */
export function Skeleton(props: { lines?: number; label?: string; className?: string }) {
  const { lines = 3, label = 'Loading', className } = props;
  return (
    <div role="status" className={clsx('flex flex-col gap-2.5 py-1', className)}>
      <span className="sr-only">{label}</span>
      {Array.from({ length: lines }, (_, index) => (
        <span
          key={index}
          aria-hidden
          className="skeleton block h-3.5"
          style={{ width: `${[96, 82, 90, 70, 86][index % 5]}%` }}
        />
      ))}
    </div>
  );
}

/** A block of the final size, so that nothing jumps when the stage or a picture arrives. */
export function SkeletonBlock(props: { label?: string; className?: string }) {
  return (
    <div role="status" className={clsx('skeleton border border-rule', props.className ?? 'h-40')}>
      <span className="sr-only">{props.label ?? 'Loading'}</span>
    </div>
  );
}

import clsx from 'clsx';

export type Shape =
  | 'triangle'
  | 'triangle-open'
  | 'checked'
  | 'current'
  | 'ahead'
  | 'crossed'
  | 'returned'
  | 'locked'
  | 'released'
  | 'struck'
  | 'dot'
  | 'ring'
  | 'pilcrow';

/** Strokes and fills on a 16 by 16 field; everything takes the text colour. */
const drawings: Record<Shape, React.ReactNode> = {
  triangle: <path d="M8 2.5 14.5 14h-13Z" fill="currentColor" />,
  'triangle-open': <path d="M8 4 13.2 13.2H2.8Z" strokeWidth="1.8" />,
  checked: (
    <>
      <path d="M1 1h14v14H1Z" fill="currentColor" stroke="none" />
      <path d="m4.5 8.2 2.4 2.4 4.6-5" className="stroke-sheet" strokeWidth="1.6" />
    </>
  ),
  current: (
    <>
      <path d="M1.5 1.5h13v13h-13Z" />
      <path d="M4.5 4.5h7v7h-7Z" fill="currentColor" stroke="none" />
    </>
  ),
  ahead: <path d="M1.5 1.5h13v13h-13Z" strokeDasharray="2.6 1.73" />,
  crossed: <path d="M1.5 1.5h13v13h-13ZM5 5l6 6M11 5l-6 6" />,
  returned: <path d="M1.5 1.5h13v13h-13ZM10.8 11.2V8.4H5.2m2-2.2-2.2 2.2 2.2 2.2" />,
  locked: (
    <>
      <path d="M2.5 7h11v8h-11Z" fill="currentColor" stroke="none" />
      <path d="M5 7V4.8a3 3 0 0 1 6 0V7" strokeWidth="1.6" />
    </>
  ),
  released: <path d="M1.5 9.5v5h13v-5M8 1.5v8.7m-3.4-3L8 10.5l3.4-3.3" strokeWidth="1.5" />,
  struck: <path d="M1.5 1.5h13v13h-13ZM1.5 14.5l13-13" />,
  dot: <circle cx="8" cy="8" r="4" fill="currentColor" stroke="none" />,
  ring: <circle cx="8" cy="8" r="4" strokeWidth="1.8" />,
  pilcrow: <path d="M9 14V2.5h4M12 14V2.5M9 8.5H7a3 3 0 0 1 0-6h2" strokeWidth="1.5" />,
};

/** The shape half of a state; decoration only, the word stands beside it. */
export function StateShape({ shape, className }: { shape: Shape; className?: string }) {
  return (
    <svg
      aria-hidden
      viewBox="0 0 16 16"
      className={clsx('inline-block shrink-0 fill-none stroke-current stroke-[1.2]', className ?? 'size-3.5')}
    >
      {drawings[shape]}
    </svg>
  );
}

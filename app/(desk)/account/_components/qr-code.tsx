import { encode } from 'uqr';

/** A QR code (ISO/IEC 18004) drawn here, in ink on white whatever the theme: readers want dark on light. */
export function QrCode({ text, label }: { text: string; label: string }) {
  const { data, size } = encode(text, { ecc: 'M', border: 4 });
  const path = data.flatMap((row, y) => row.map((dark, x) => (dark ? `M${x} ${y}h1v1h-1z` : ''))).join('');
  return (
    <svg
      role="img"
      aria-label={label}
      viewBox={`0 0 ${size} ${size}`}
      shapeRendering="crispEdges"
      className="size-52 shrink-0 border border-rule"
    >
      <rect width={size} height={size} fill="#fff" />
      <path d={path} fill="#1D2321" />
    </svg>
  );
}

import { Path, Svg } from '@react-pdf/renderer';
import { statusColour, verdigris, ink } from './styles';

const drawings: Record<string, { d: string; fill: boolean }> = {
  pass: { d: 'M1.5 5.6 4.2 8.4 8.8 2.2', fill: false },
  caution: { d: 'M5 1.2 9.3 8.8 0.7 8.8Z', fill: false },
  fail: { d: 'M5 0.8 9.6 9.2 0.4 9.2Z', fill: true },
  'not-run': { d: 'M1.5 5 8.5 5', fill: false },
};

/** Shape of a status; its word stands beside it, so that neither colour nor shape speaks alone. */
export function StatusShape({ status }: { status: string }) {
  const { d, fill } = drawings[status] ?? drawings['not-run'];
  const colour = statusColour[status] ?? statusColour['not-run'];
  return (
    <Svg width={7.5} height={7.5} viewBox="0 0 10 10" style={{ marginTop: 2, marginRight: 4 }}>
      <Path d={d} stroke={colour} strokeWidth={1.5} fill={fill ? colour : 'none'} />
    </Svg>
  );
}

/** The product's mark: a template in ink with the sheet drawn down over it. */
export function Mark() {
  return (
    <Svg width={23} height={17.25} viewBox="0 0 32 24">
      <Path
        d="M9.2 20.5 12.4 8.6a1 1 0 0 1 .95-.73h5.3a1 1 0 0 1 .95.73l3.2 11.9"
        stroke={ink}
        strokeWidth={1.8}
        fill="none"
      />
      <Path
        d="M1 20.5h3.6c.75 0 1.4-.5 1.58-1.22L9.5 6.2A2.9 2.9 0 0 1 12.3 4h7.4a2.9 2.9 0 0 1 2.8 2.2l3.32 13.08c.19.72.83 1.22 1.58 1.22H31"
        stroke={verdigris}
        strokeWidth={2.2}
        fill="none"
      />
    </Svg>
  );
}

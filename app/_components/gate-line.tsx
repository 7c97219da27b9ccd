import clsx from 'clsx';
import { DueDay } from './due-day';
import { StateShape, type Shape } from './state-shape';
import { Time } from './time';

export interface GateSignature {
  name: string;
  role?: string;
  /** ISO 8601 instant. */
  at: string;
  /** The words the signer left. */
  words?: string;
}

export interface GateStep {
  id: string;
  name: string;
  state: 'passed' | 'open' | 'ahead' | 'returned';
  signatures?: readonly GateSignature[];
  /** Who is awaited at an open gate, and since when. */
  awaited?: {
    names: readonly string[];
    since?: string;
    /** A day, `2026-10-25`. */
    due?: string;
    have?: number;
    needed?: number;
    /** All of the names are needed, not some. */
    everybody?: boolean;
  };
  /** One plain line, such as `passed 09:42, one finding waived`, or what a gate ahead is for. */
  line?: React.ReactNode;
}

const shapes: Record<GateStep['state'], { shape: Shape; word: string; tone: string }> = {
  passed: { shape: 'checked', word: 'passed', tone: 'text-ink' },
  open: { shape: 'current', word: 'open', tone: 'text-verdigris' },
  ahead: { shape: 'ahead', word: 'not yet open', tone: 'text-slate' },
  returned: { shape: 'returned', word: 'returned', tone: 'text-madder' },
};

/** Gates in order: who signed, when and with what words; who is awaited, and how long. */
export function GateLine({ gates, framed = false }: { gates: readonly GateStep[]; framed?: boolean }) {
  return (
    <ol
      aria-label="Gates"
      className={clsx(
        'flex flex-col gap-px overflow-hidden bg-rule md:flex-row',
        framed && 'border border-ink',
      )}
    >
      {gates.map((gate) => (
        <GateCell key={gate.id} gate={gate} />
      ))}
    </ol>
  );
}

function GateCell({ gate }: { gate: GateStep }) {
  const { shape, word, tone } = shapes[gate.state];
  const open = gate.state === 'open';
  return (
    <li
      aria-current={open ? 'step' : undefined}
      className={clsx(
        'flex min-w-0 grow basis-0 gap-2.5 px-3 pt-2.5 pb-3',
        open ? 'bg-verdigris-wash md:grow-[1.4]' : 'bg-sheet',
      )}
    >
      <StateShape shape={shape} className={clsx('mt-1 size-4', tone)} />
      <div className="min-w-0">
        <p className={clsx('text-base font-semibold', gate.state === 'ahead' && 'text-slate')}>
          {gate.name}
          <span className={gate.state === 'returned' ? 'font-medium text-madder' : 'sr-only'}>
            {gate.state === 'returned' ? ' ' : ', '}
            {word}
          </span>
        </p>
        {gate.line ? <p className="text-sm text-slate">{gate.line}</p> : null}
        {gate.signatures?.map((signature) => (
          <p key={`${signature.name}-${signature.at}`} className="text-sm text-slate">
            <span className="text-ink">{signature.name}</span>
            {signature.role ? `, ${signature.role}` : ''}, <Time at={signature.at} show="moment" />
            {signature.words ? <span className="text-ink"> “{signature.words}”</span> : null}
          </p>
        ))}
        {gate.awaited ? <Awaited {...gate.awaited} /> : null}
      </div>
    </li>
  );
}

function Awaited({ names, since, due, have, needed, everybody }: NonNullable<GateStep['awaited']>) {
  return (
    <p className="text-sm text-slate">
      waits for{' '}
      <span className="font-medium text-ink">
        {names.length > 0 ? joinNames(names, everybody ? 'and' : 'or') : 'someone to be named'}
      </span>
      {since ? (
        <>
          {' '}
          since <Time at={since} show="span" />
        </>
      ) : null}
      {due ? (
        <>
          , due <DueDay on={due} standing="in_review" />
        </>
      ) : null}
      {needed && needed > 1 ? `, ${have ?? 0} of ${needed} signed` : ''}
    </p>
  );
}

/** `A`, `A or B`, `A, B or C`. */
export function joinNames(names: readonly string[], last: 'or' | 'and' = 'or'): string {
  if (names.length < 2) return names[0] ?? '';
  return `${names.slice(0, -1).join(', ')} ${last} ${names[names.length - 1]}`;
}

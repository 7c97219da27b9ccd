'use client';

import { useRouter } from 'next/navigation';
import { useEffect, useRef, useState } from 'react';
import { api, ApiError, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Checkbox } from '@/app/_components/checkbox';
import { FormProblem } from '@/app/_components/form-problem';
import { notify } from '@/app/_components/notices';
import {
  isClients,
  mostGates,
  peopleProblems,
  planHints,
  shapeProblems,
  type Invited,
  type PlanPerson,
  type PlanProblem,
} from '@/lib/workspaces/check-gate-plan';
import type { GatePlanView } from '@/lib/workspaces/gate-plan-schemas';
import { GateFields } from './gate-fields';
import { Hint } from './hint';
import { draftOf, fieldProblems, inputOf, moved, newGate, type DraftGate } from './plan-draft';

export interface PlanEditorProps {
  apiPath: string;
  /** The plan as it stands now. */
  plan: GatePlanView;
  /** The plan as it stood when the editor was opened. */
  startedFrom: GatePlanView;
  people: readonly PlanPerson[];
  invited: Invited;
  onDone: () => void;
}

type Focus = { id: string; at: 'name' | 'up' | 'down' };

/** Changes the gates, their order and who signs them; nothing stands before it is set as the next version. */
export function PlanEditor({ apiPath, plan, startedFrom, people, invited, onDone }: PlanEditorProps) {
  const router = useRouter();
  const [gates, setGates] = useState<DraftGate[]>(() => startedFrom.gates.map(draftOf));
  const [endsWithoutClient, setEndsWithoutClient] = useState(
    () => !endsWithClient(startedFrom.gates.map(draftOf), people),
  );
  const [problems, setProblems] = useState<PlanProblem[]>([]);
  const [problem, setProblem] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const [said, setSaid] = useState('');
  const form = useRef<HTMLFormElement>(null);
  const focus = useRef<Focus | null>(null);

  // A gate that moved or came keeps the reader's place: their key stays under their finger.
  useEffect(() => {
    const wanted = focus.current;
    if (!wanted) return;
    focus.current = null;
    const fields = form.current?.querySelector(`[data-gate="${wanted.id}"]`);
    const target = fields?.querySelector<HTMLElement>(`[data-focus="${wanted.at}"]:not(:disabled)`);
    (target ?? fields?.querySelector<HTMLElement>('input'))?.focus();
  }, [gates]);
  // What is wrong is where the reader goes next.
  useEffect(() => {
    if (!problems.length) return;
    const wrong = form.current?.querySelector<HTMLElement>('[aria-invalid="true"], [data-wrong]');
    const itself = wrong?.matches('input, textarea, [tabindex]');
    (itself ? wrong : wrong?.querySelector<HTMLElement>('input:checked, input'))?.focus();
  }, [problems]);

  const inputs = gates.map(inputOf);
  const hints = planHints(inputs, people, invited);
  const withClient = endsWithClient(gates, people);

  function change(id: string, part: Partial<DraftGate>) {
    setGates((now) => now.map((gate) => (gate.id === id ? { ...gate, ...part } : gate)));
  }
  function move(from: number, to: number) {
    const gate = gates[from];
    focus.current = { id: gate.id, at: to < from ? 'up' : 'down' };
    setProblems([]);
    setGates(moved(gates, from, to));
    setSaid(`${gate.name || 'The gate'} is now gate ${to + 1} of ${gates.length}.`);
  }
  function add(kind: DraftGate['kind']) {
    const gate = newGate(kind);
    focus.current = { id: gate.id, at: 'name' };
    setProblems([]);
    // The client signs last: what is added comes before.
    const at = kind === 'automatic' || withClient ? Math.max(0, gates.length - 1) : gates.length;
    setGates([...gates.slice(0, at), gate, ...gates.slice(at)]);
    setSaid(`Gate ${at + 1} was added.`);
  }
  function remove(at: number) {
    const rest = gates.filter((_, index) => index !== at);
    const next = rest[Math.min(at, rest.length - 1)];
    focus.current = next ? { id: next.id, at: 'name' } : null;
    setProblems([]);
    setGates(rest);
    setSaid(`${gates[at].name || 'The gate'} was taken out.`);
  }

  async function save() {
    const ends = { gates: inputs, endsWithoutClient: endsWithoutClient && !withClient };
    const found = [...fieldProblems(gates), ...shapeProblems(inputs)];
    if (!found.length) found.push(...peopleProblems(ends, people, invited));
    setProblems(found);
    setProblem(
      found.length ? (found.find(({ at }) => at === null)?.detail ?? 'Look at what is marked above.') : null,
    );
    if (found.length) return;
    setBusy(true);
    try {
      const { number } = await api<GatePlanView>(`${apiPath}/gate-plan`, {
        method: 'PUT',
        ifMatch: `"${startedFrom.number}"`,
        body: ends,
      });
      notify(
        number === startedFrom.number
          ? 'Nothing was changed, so the plan stays as it was.'
          : `Version ${number} of the gate plan stands. The next revision that is posted gets it.`,
      );
      onDone();
      router.refresh();
    } catch (error) {
      if (error instanceof ApiError) setProblems(error.errors.map(problemOf));
      setProblem(explainError(error).detail);
    } finally {
      setBusy(false);
    }
  }

  return (
    <form
      ref={form}
      noValidate
      aria-label="Change the gate plan"
      onSubmit={(event) => {
        event.preventDefault();
        void save();
      }}
    >
      <p role="status" className="sr-only">
        {said}
      </p>
      {plan.number === startedFrom.number ? null : (
        <div className="mb-4">
          <FormProblem>
            Version {plan.number} was set by {plan.madeBy ?? 'somebody else'} while you were changing version{' '}
            {startedFrom.number}. Leave this one, look at what changed, and begin again.
          </FormProblem>
        </div>
      )}
      <ol className="flex flex-col gap-4">
        {gates.map((gate, at) => (
          <GateFields
            key={gate.id}
            gate={gate}
            at={at}
            count={gates.length}
            people={people}
            problems={problems.filter((one) => one.at === at)}
            hint={hints.find((one) => one.at === at)?.detail}
            onChange={(part) => change(gate.id, part)}
            onMove={(to) => move(at, to)}
            onRemove={() => remove(at)}
          />
        ))}
      </ol>
      <div className="mt-4 flex flex-wrap gap-2.5">
        <Button isDisabled={gates.length >= mostGates} onPress={() => add('people')}>
          Add a gate that people sign
        </Button>
        <Button isDisabled={gates.length >= mostGates} onPress={() => add('automatic')}>
          Add an automatic gate
        </Button>
      </div>
      <div className="mt-6 flex flex-col items-start gap-3 border-t border-ink pt-4">
        {withClient ? null : (
          <Checkbox
            label="This plan ends without the client"
            help="The studio’s last signature locks the revision, and nobody of the client has to agree."
            value={endsWithoutClient}
            onChange={setEndsWithoutClient}
          />
        )}
        {hints
          .filter(({ at }) => at === null)
          .map(({ detail }) => (
            <Hint key={detail}>{detail}</Hint>
          ))}
        <p className="max-w-prose text-sm text-slate">
          Revisions in review keep the version that they started with. People’s gates stay shut, whatever the
          plan says, while an item of the docket must be settled.
        </p>
        <FormProblem>{problem}</FormProblem>
        <div className="flex flex-wrap gap-2.5">
          <Button isDisabled={busy} onPress={onDone}>
            Leave it as it was
          </Button>
          <Button type="submit" variant="primary" isPending={busy}>
            Set as version {startedFrom.number + 1}
          </Button>
        </div>
      </div>
    </form>
  );
}

function endsWithClient(gates: readonly DraftGate[], people: readonly PlanPerson[]): boolean {
  const last = gates.filter(({ kind }) => kind === 'people').at(-1);
  return last !== undefined && isClients(inputOf(last), people);
}

/** `/gates/2/quorum` of the server's answer. */
function problemOf({ pointer, detail }: { pointer: string; detail: string }): PlanProblem {
  const [, , at, field = 'gates'] = pointer.split('/');
  return { at: at === undefined ? null : Number(at), field, detail };
}

'use client';

import { useId } from 'react';
import { Button } from '@/app/_components/button';
import { Checkbox } from '@/app/_components/checkbox';
import { NumberField } from '@/app/_components/number-field';
import { RadioGroup } from '@/app/_components/radio-group';
import { TextArea, TextField } from '@/app/_components/text-field';
import {
  gateConditions,
  mostDueDays,
  signingRoles,
  type PlanPerson,
  type PlanProblem,
} from '@/lib/workspaces/check-gate-plan';
import { Hint } from './hint';
import { gateSentence } from './plan-list';
import { viewOf, type DraftGate } from './plan-draft';

interface Props {
  gate: DraftGate;
  /** From 0. */
  at: number;
  count: number;
  people: readonly PlanPerson[];
  problems: readonly PlanProblem[];
  hint?: string;
  onChange: (part: Partial<DraftGate>) => void;
  onMove: (to: number) => void;
  onRemove: () => void;
}

const chosen = ({ kind, conditions, who, roles, people }: DraftGate) =>
  (kind === 'automatic' ? conditions : who === 'roles' ? roles : people).length > 0;

const conditionLabels: Record<(typeof gateConditions)[number], string> = {
  'checks-pass': 'The check run has finished and no failing finding is open',
  'docket-settled': 'Nothing on the docket is left that must be settled',
};

/** One gate of the plan while it is changed, under the sentence by which people will read it. */
export function GateFields({ gate, at, count, people, problems, hint, onChange, onMove, onRemove }: Props) {
  const heading = useId();
  const named = gate.name.trim() || `Gate ${at + 1}`;
  const error = (...fields: string[]) => problems.find(({ field }) => fields.includes(field))?.detail;
  return (
    <li data-gate={gate.id} aria-labelledby={heading} className="border border-rule bg-sheet">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2 border-b border-rule px-4 py-2.5">
        <span aria-hidden className="font-mono text-lg text-slate">
          {at + 1}
        </span>
        <h2 id={heading} className="text-lg font-semibold wrap-anywhere">
          {named}
        </h2>
        <span className="text-sm text-slate">
          {gate.kind === 'people' ? 'signed by people' : 'automatic'}
        </span>
        <div className="ml-auto flex gap-1.5">
          <Mover
            label={`Move ${named} up`}
            mark="↑"
            isDisabled={at === 0}
            name="up"
            onPress={() => onMove(at - 1)}
          />
          <Mover
            label={`Move ${named} down`}
            mark="↓"
            isDisabled={at === count - 1}
            name="down"
            onPress={() => onMove(at + 1)}
          />
          <Button size="small" variant="plain" onPress={onRemove} aria-label={`Take out ${named}`}>
            Take out
          </Button>
        </div>
        <p className="w-full text-sm text-slate" aria-live="off">
          {chosen(gate) ? gateSentence(viewOf(gate, people)) : 'Nothing is chosen yet.'}
        </p>
        {error('kind', 'key') ? <Wrong>{error('kind', 'key')}</Wrong> : null}
      </div>
      <div className="grid gap-x-8 gap-y-4 px-4 py-4 md:grid-cols-2">
        <TextField
          label="Name"
          value={gate.name}
          onChange={(name) => onChange({ name })}
          error={error('name')}
          maxLength={40}
          isRequired
          className="md:max-w-80"
        />
        {gate.kind === 'automatic' ? (
          <Ticks
            legend="Passes when"
            error={error('conditions')}
            options={gateConditions.map((value) => ({ value, label: conditionLabels[value] }))}
            value={gate.conditions}
            onChange={(conditions) => onChange({ conditions })}
          />
        ) : (
          <PeopleFields gate={gate} people={people} error={error} onChange={onChange} />
        )}
        {hint ? (
          <div className="md:col-span-2">
            <Hint>{hint}</Hint>
          </div>
        ) : null}
      </div>
    </li>
  );
}

type PeopleProps = Pick<Props, 'gate' | 'people' | 'onChange'> & {
  error: (...fields: string[]) => string | undefined;
};

function PeopleFields({ gate, people, error, onChange }: PeopleProps) {
  const mayBeNamed = people.filter(({ role }) => (signingRoles as readonly string[]).includes(role));
  return (
    <>
      <NumberField
        label="Due"
        help="Reminders go out on the day before and on the day."
        unit="days after it opens"
        min={1}
        max={mostDueDays}
        optional
        value={gate.dueDays}
        onChange={(dueDays) => onChange({ dueDays })}
        error={error('dueDays')}
        className="md:max-w-80"
      />
      <div className="flex flex-col gap-3">
        <RadioGroup
          label="Who signs"
          orientation="horizontal"
          options={[
            { value: 'roles', label: 'Whoever has a role' },
            { value: 'people', label: 'Named people' },
          ]}
          value={gate.who}
          onChange={(who) => onChange({ who: who as DraftGate['who'] })}
        />
        {gate.who === 'roles' ? (
          <Ticks
            legend="Roles"
            error={error('roles')}
            options={signingRoles.map((value) => ({ value, label: value }))}
            value={gate.roles}
            onChange={(roles) => onChange({ roles })}
          />
        ) : (
          <Ticks
            legend="People"
            error={error('people', 'roles')}
            options={mayBeNamed.map(({ id, name, role }) => ({ value: id, label: `${name}, ${role}` }))}
            value={gate.people}
            onChange={(chosen) => onChange({ people: chosen })}
          />
        )}
      </div>
      <div className="flex flex-col gap-3">
        <RadioGroup
          label="How many"
          orientation="horizontal"
          options={[
            { value: 'one', label: 'One' },
            { value: 'several', label: 'Several' },
            { value: 'all', label: 'Everybody' },
          ]}
          value={gate.howMany}
          onChange={(howMany) => onChange({ howMany: howMany as DraftGate['howMany'] })}
          error={gate.howMany === 'several' ? undefined : error('quorum')}
        />
        {gate.howMany === 'several' ? (
          <NumberField
            label="Signatures"
            min={1}
            max={50}
            value={gate.several}
            onChange={(several) => onChange({ several })}
            error={error('quorum')}
            className="max-w-40"
          />
        ) : null}
        <Checkbox
          label="Four eyes: the author of a revision never signs"
          value={gate.fourEyes}
          onChange={(fourEyes) => onChange({ fourEyes })}
          error={error('fourEyes')}
        />
      </div>
      <TextArea
        label="Words that are signed"
        rows={2}
        value={gate.meaning}
        onChange={(meaning) => onChange({ meaning })}
        error={error('meaning')}
        maxLength={300}
        isRequired
        className="md:col-span-2"
      />
    </>
  );
}

interface TicksProps<V extends string> {
  legend: string;
  options: readonly { value: V; label: string }[];
  value: readonly V[];
  onChange: (value: V[]) => void;
  error?: string;
}

/** Any number of a few choices; the order is that of the choices. */
function Ticks<V extends string>({ legend, options, value, onChange, error }: TicksProps<V>) {
  const wrong = useId();
  return (
    <fieldset className="min-w-0" aria-describedby={error ? wrong : undefined}>
      <legend className="text-sm font-semibold">{legend}</legend>
      <div className="mt-1 flex max-h-56 flex-col overflow-auto">
        {options.map((option) => (
          <Checkbox
            key={option.value}
            label={<span className="first-letter:uppercase inline-block">{option.label}</span>}
            value={value.includes(option.value)}
            onChange={(ticked) =>
              onChange(
                options
                  .map((one) => one.value)
                  .filter((one) => (one === option.value ? ticked : value.includes(one))),
              )
            }
          />
        ))}
      </div>
      {error ? <Wrong id={wrong}>{error}</Wrong> : null}
    </fieldset>
  );
}

function Wrong({ id, children }: { id?: string; children?: string }) {
  return (
    <p
      id={id}
      data-wrong=""
      tabIndex={-1}
      className="flex w-full gap-1.5 text-sm font-medium text-madder outline-offset-2"
    >
      <span aria-hidden>▲</span>
      <span>{children}</span>
    </p>
  );
}

function Mover(props: {
  label: string;
  mark: string;
  name: 'up' | 'down';
  isDisabled: boolean;
  onPress: () => void;
}) {
  return (
    <Button
      size="small"
      aria-label={props.label}
      data-focus={props.name}
      isDisabled={props.isDisabled}
      onPress={props.onPress}
    >
      <span aria-hidden>{props.mark}</span>
    </Button>
  );
}

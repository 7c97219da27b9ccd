'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, ApiError, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { FormProblem } from '@/app/_components/form-problem';
import { notify } from '@/app/_components/notices';
import { NumberField } from '@/app/_components/number-field';
import { LIMIT_KEYS, LIMIT_RULES, type LimitKey } from '@/lib/formability/limits';
import type { LibraryView } from '@/lib/studio/schemas';

type Values = Record<LimitKey, number | null>;
type Props = { apiPath: string; limits: LibraryView['limits']; maySet: boolean };

const start = (moved: Props['limits']['moved']): Values =>
  Object.fromEntries(LIMIT_KEYS.map((key) => [key, moved[key] ?? LIMIT_RULES[key].value])) as Values;
const sentence = (text: string) => text[0].toUpperCase() + text.slice(1);
/** Ratios have no unit of their own. */
const unitOf = (key: LimitKey) =>
  LIMIT_RULES[key].unit === 'deg' ? '°' : LIMIT_RULES[key].unit || undefined;

/** The limits of the checks with what each rests on; a lead moves them for the studio. */
export function LimitsForm({ apiPath, limits, maySet }: Props) {
  const router = useRouter();
  const [values, setValues] = useState(() => start(limits.moved));
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const [errors, setErrors] = useState<Partial<Record<LimitKey, string>>>({});
  const saved = start(limits.moved);
  const changed = LIMIT_KEYS.filter((key) => values[key] !== saved[key]);

  async function save() {
    const missing = LIMIT_KEYS.filter((key) => values[key] == null);
    if (missing.length)
      return setErrors(Object.fromEntries(missing.map((key) => [key, 'Give a number, or put it back.'])));
    setBusy(true);
    setProblem(null);
    setErrors({});
    try {
      const moved = LIMIT_KEYS.filter((key) => values[key] !== LIMIT_RULES[key].value);
      await api(`${apiPath}/limits`, {
        method: 'PUT',
        ifMatch: `"${limits.version}"`,
        body: { limits: Object.fromEntries(moved.map((key) => [key, values[key]])) },
      });
      notify('The limits were set. Revisions posted from now on are checked against them.');
      router.refresh();
    } catch (error) {
      if (error instanceof ApiError && error.errors.length)
        setErrors(
          Object.fromEntries(error.errors.map(({ pointer, detail }) => [pointer.split('/')[2], detail])),
        );
      setProblem(explainError(error).detail);
    } finally {
      setBusy(false);
    }
  }

  return (
    <form
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        void save();
      }}
    >
      <ul className="border border-rule bg-sheet">
        {LIMIT_KEYS.map((key) => (
          <li
            key={key}
            className="grid items-center gap-x-6 gap-y-2 border-b border-rule px-4 py-3 last:border-b-0 md:grid-cols-[1fr_18rem]"
          >
            <div className="min-w-0">
              <p>{sentence(LIMIT_RULES[key].label)}</p>
              <p className="text-sm text-slate">
                {LIMIT_RULES[key].source}
                {limits.moved[key] === undefined
                  ? null
                  : ` · moved by the studio from ${LIMIT_RULES[key].value} ${LIMIT_RULES[key].unit}`}
              </p>
            </div>
            {maySet ? (
              <div className="flex items-end gap-2">
                <NumberField
                  label={sentence(LIMIT_RULES[key].label)}
                  hideLabel
                  className="flex-1"
                  unit={unitOf(key)}
                  step={stepOf(key)}
                  value={values[key]}
                  onChange={(value) => setValues((now) => ({ ...now, [key]: value }))}
                  error={errors[key]}
                />
                {values[key] === LIMIT_RULES[key].value ? null : (
                  <Button
                    size="small"
                    variant="plain"
                    className="whitespace-nowrap"
                    aria-label={`Put back: ${LIMIT_RULES[key].label}`}
                    onPress={() => setValues((now) => ({ ...now, [key]: LIMIT_RULES[key].value }))}
                  >
                    Put back
                  </Button>
                )}
              </div>
            ) : (
              <span className="font-mono tabular-nums md:text-right">
                {saved[key]} {unitOf(key)}
              </span>
            )}
          </li>
        ))}
      </ul>
      {maySet ? (
        <div className="mt-4 flex flex-col items-start gap-3">
          <FormProblem>{problem}</FormProblem>
          <Button type="submit" variant="primary" isPending={busy} isDisabled={changed.length === 0}>
            {changed.length === 0
              ? 'Set limits'
              : changed.length === 1
                ? 'Set 1 limit'
                : `Set ${changed.length} limits`}
          </Button>
        </div>
      ) : null}
    </form>
  );
}

function stepOf(key: LimitKey): number {
  const { value } = LIMIT_RULES[key];
  return value >= 10 ? 1 : value >= 1 ? 0.5 : value >= 0.1 ? 0.05 : 0.005;
}

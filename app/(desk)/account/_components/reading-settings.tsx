'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '../../../_components/button';
import { FormProblem } from '../../../_components/form-problem';
import { notify } from '../../../_components/notices';
import type { Theme, Units } from '../../../_components/preferences';
import { usePreferences } from '../../../_components/preferences-context';
import { RadioGroup } from '../../../_components/radio-group';
import { updatePerson } from './update-person';

/** Settings that take effect at once; units and zone also travel with the person, the theme stays on this device. */
export function ReadingSettings({ mailZone }: { mailZone: string }) {
  const router = useRouter();
  const { units, setUnits, theme, setTheme, zone } = usePreferences();
  const [problem, setProblem] = useState<string | null>(null);

  async function chooseUnits(next: Units) {
    const before = units;
    setUnits(next);
    const failed = await updatePerson({ units: next });
    setProblem(failed);
    if (failed) setUnits(before);
  }

  async function useThisZone() {
    const failed = await updatePerson({ timeZone: zone });
    setProblem(failed);
    if (failed) return;
    notify(`Mails now give times for ${zone}.`);
    router.refresh();
  }

  return (
    <div className="flex flex-col gap-5">
      <RadioGroup
        label="Lengths"
        orientation="horizontal"
        value={units}
        onChange={(value) => chooseUnits(value as Units)}
        options={[
          { value: 'mm', label: 'Millimetres' },
          { value: 'in', label: 'Inches' },
        ]}
      />
      <RadioGroup
        label="Theme on this device"
        orientation="horizontal"
        value={theme}
        onChange={(value) => setTheme(value as Theme)}
        options={[
          { value: 'system', label: 'As the system' },
          { value: 'light', label: 'Light' },
          { value: 'dark', label: 'Dark' },
        ]}
      />
      <div className="flex flex-col items-start gap-2">
        <p className="text-sm font-semibold">Times</p>
        <p>
          Pages follow this device: <strong>{zone}</strong>. Mails follow <strong>{mailZone}</strong>.
        </p>
        {zone === mailZone ? null : (
          <Button size="small" onPress={useThisZone}>
            Use {zone} in mails too
          </Button>
        )}
      </div>
      <FormProblem>{problem}</FormProblem>
    </div>
  );
}

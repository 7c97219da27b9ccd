'use client';

import { Controller, type Control, type FieldValues } from 'react-hook-form';
import { NumberField } from '@/app/_components/number-field';
import { SectionHead } from '@/app/_components/section-head';
import { Select } from '@/app/_components/select';
import { Switch } from '@/app/_components/checkbox';
import { recipeSections, type RecipeField } from './recipe-fields';

type Props = {
  control: Control<FieldValues>;
  disabled?: boolean;
  presets?: Partial<Record<string, React.ReactNode>>;
};

/** The whole recipe, section by section. Values live in react-hook-form under the engine's own names. */
export function RecipeForm({ control, disabled, presets = {} }: Props) {
  return (
    <div className="flex flex-col gap-8">
      {recipeSections.map((section) => (
        <section key={section.key} aria-labelledby={`recipe-${section.key}`}>
          <SectionHead title={section.title} id={`recipe-${section.key}`} />
          <div className="mt-2 flex flex-wrap items-end justify-between gap-3">
            <p className="text-sm text-slate">{section.lead}</p>
            {presets[section.key]}
          </div>
          <div className="mt-3 grid grid-cols-1 gap-x-5 gap-y-4 sm:grid-cols-2 xl:grid-cols-3">
            {section.fields.map((field) => (
              <OneField key={field.path} field={field} control={control} disabled={disabled} />
            ))}
          </div>
        </section>
      ))}
    </div>
  );
}

function OneField({
  field,
  control,
  disabled,
}: {
  field: RecipeField;
  control: Control<FieldValues>;
  disabled?: boolean;
}) {
  return (
    <Controller
      name={field.path}
      control={control}
      render={({ field: bound, fieldState }) => {
        const shared = { label: field.label, help: field.help, error: fieldState.error?.message, disabled };
        if (field.kind === 'number')
          return (
            <NumberField
              {...shared}
              {...bound}
              unit={field.unit}
              min={field.min}
              max={field.max}
              step={field.step}
            />
          );
        if (field.kind === 'choice') return <Select {...shared} {...bound} options={field.options} />;
        return <Switch {...shared} {...bound} value={Boolean(bound.value)} />;
      }}
    />
  );
}

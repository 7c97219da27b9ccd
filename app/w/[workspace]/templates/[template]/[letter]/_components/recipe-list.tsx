/** A recipe as labels and values, two abreast where there is room. */
export function RecipeList({ lines }: { lines: readonly { label: string; value: string }[] }) {
  return (
    <ul className="grid gap-x-8 sm:grid-cols-2">
      {lines.map(({ label, value }) => (
        <li key={label} className="flex justify-between gap-3 text-sm">
          <span className="shrink-0 text-slate">{label}</span>
          <span className="min-w-0 text-right font-mono text-xs leading-5">{value}</span>
        </li>
      ))}
    </ul>
  );
}

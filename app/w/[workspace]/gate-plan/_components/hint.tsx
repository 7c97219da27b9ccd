/** Something to know that keeps nothing from being set. */
export function Hint({ children }: { children: string }) {
  return (
    <p className="flex gap-1.5 text-sm text-ochre-ink">
      <span aria-hidden>△</span>
      <span>{children}</span>
    </p>
  );
}

/**
 * Where focus goes when an item leaves its group: the item after it, the one before, or the docket's head.
 * Call before the change; the answer, called after it, moves focus only if the change has taken it away.
 */
export function keepFocus(itemKey: string): () => void {
  const item = document.getElementById(itemKey);
  const beside = item?.nextElementSibling?.id || item?.previousElementSibling?.id || 'docket-title';
  return () => {
    requestAnimationFrame(() => {
      if (document.activeElement && document.activeElement !== document.body) return;
      (document.getElementById(beside) ?? document.getElementById('docket-title'))?.focus();
    });
  };
}

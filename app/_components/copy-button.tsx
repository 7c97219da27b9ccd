'use client';

import { Button } from './button';
import { notify } from './notices';

/** Copies a text such as a full digest or an invitation address. */
export function CopyButton({ text, what }: { text: string; what: string }) {
  async function copy() {
    try {
      await navigator.clipboard.writeText(text);
      notify(`Copied ${what}.`);
    } catch {
      notify(`The browser did not allow copying ${what}. Select the text and copy it by hand.`, {
        kind: 'trouble',
      });
    }
  }
  return (
    <Button size="small" variant="quiet" onPress={copy} aria-label={`Copy ${what}`}>
      Copy
    </Button>
  );
}

'use client';

import { Button } from '../../../_components/button';
import { CopyButton } from '../../../_components/copy-button';

/** Recovery codes, shown this once: only their hashes are kept. */
export function RecoveryCodes({ codes, onKept }: { codes: readonly string[]; onKept: () => void }) {
  return (
    <section aria-label="Recovery codes" className="flex w-full flex-col items-start gap-3">
      <p>
        <strong className="font-semibold">Keep these recovery codes now; they are not shown again.</strong>{' '}
        Each signs you in once, when your authenticator is not at hand. Print them, or keep them where your
        passwords are.
      </p>
      <ul className="grid w-full grid-cols-1 gap-x-8 gap-y-1 border border-rule bg-sheet px-4 py-3 font-mono tabular sm:grid-cols-2">
        {codes.map((code) => (
          <li key={code}>{code}</li>
        ))}
      </ul>
      <div className="flex flex-wrap items-center gap-3">
        <CopyButton text={codes.join('\n')} what="the recovery codes" />
        <Button variant="primary" onPress={onKept}>
          I have kept them
        </Button>
      </div>
    </section>
  );
}

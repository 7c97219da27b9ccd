'use client';

import { Button } from '@/app/_components/button';
import { Switch } from '@/app/_components/checkbox';
import { DialogTrigger, Popover } from '@/app/_components/popover';
import { useKeysOn } from '../_hooks/use-room-keys';

const keys = [
  ['n', 'next item of the docket'],
  ['p', 'the one before'],
  ['/', 'filter the docket'],
  ['c', 'write a note'],
] as const;

/** What single keys do on this page, and the way to switch them off. */
export function KeysHelp() {
  const [on, setOn] = useKeysOn();
  return (
    <DialogTrigger>
      <Button aria-label="Keys of this page" className="max-sm:hidden">
        Keys
      </Button>
      <Popover label="Keys of this page" placement="bottom end">
        <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1.5 text-base">
          {keys.map(([key, what]) => (
            <div key={key} className="contents">
              <dt>
                <kbd className="border border-edge bg-paper px-1.5 text-sm">{key}</kbd>
              </dt>
              <dd>{what}</dd>
            </div>
          ))}
        </dl>
        <div className="mt-3 border-t border-rule pt-3">
          <Switch label="Single keys work on this page" value={on} onChange={setOn} />
        </div>
      </Popover>
    </DialogTrigger>
  );
}

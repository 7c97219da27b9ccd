'use client';

import { useEditorState, type Editor } from '@tiptap/react';
import { useState, type ReactNode } from 'react';
import { DialogTrigger, Separator, ToggleButton, Toolbar } from 'react-aria-components';
import { Button } from '../button';
import { Popover } from '../popover';
import { TextField } from '../text-field';
import { hrefFromTyping } from './note-link';

const stroke = { fill: 'none', stroke: 'currentColor', strokeWidth: 1.5 };
const icons = {
  bullets: <path {...stroke} d="M6 4h9M6 8h9M6 12h9M2 4h1.5M2 8h1.5M2 12h1.5" />,
  numbers: (
    <>
      <path {...stroke} d="M7 4h8M7 8h8M7 12h8" />
      <path
        {...stroke}
        strokeWidth="1.1"
        d="M2 3.2 3 2.5V6M1.8 9.8c.2-1 1.9-1 1.8.1 0 .8-1.8 1.3-1.8 2.6h2"
      />
    </>
  ),
  quote: <path {...stroke} d="M3 3v10M7 5h8M7 8h8M7 11h5" />,
  link: (
    <path
      {...stroke}
      d="M6.8 9.2a2.6 2.6 0 0 0 3.7 0l2.4-2.4a2.6 2.6 0 0 0-3.7-3.7L8.3 4M9.2 6.8a2.6 2.6 0 0 0-3.7 0L3.1 9.2a2.6 2.6 0 0 0 3.7 3.7l.9-.9"
    />
  ),
};

const icon = (name: keyof typeof icons) => (
  <svg aria-hidden viewBox="0 0 16 16" className="size-4">
    {icons[name]}
  </svg>
);

const toolClass =
  'flex size-8 items-center justify-center border border-transparent text-base text-slate hover:text-ink data-selected:border-ink data-selected:text-ink pointer-coarse:size-11';

/** The editor's tools: one Tab stop, arrows move along. */
export function NoteToolbar({ editor }: { editor: Editor }) {
  const on = useEditorState({
    editor,
    selector: ({ editor: e }) => ({
      bold: e.isActive('bold'),
      italic: e.isActive('italic'),
      bullets: e.isActive('bulletList'),
      numbers: e.isActive('orderedList'),
      quote: e.isActive('blockquote'),
      link: e.isActive('link'),
    }),
  });
  const run = () => editor.chain().focus();
  const tool = (label: string, isSelected: boolean, act: () => void, children: ReactNode) => (
    <ToggleButton aria-label={label} isSelected={isSelected} onChange={act} className={toolClass}>
      {children}
    </ToggleButton>
  );
  return (
    <Toolbar
      aria-label="Text"
      className="flex flex-wrap items-center gap-0.5 border-b border-rule px-1 py-0.5"
    >
      {tool('Bold', on.bold, () => run().toggleBold().run(), <span className="font-bold">B</span>)}
      {tool('Italic', on.italic, () => run().toggleItalic().run(), <em className="font-semibold">I</em>)}
      <Separator orientation="vertical" className="mx-1 h-5 border-l border-rule" />
      {tool('Bullet list', on.bullets, () => run().toggleBulletList().run(), icon('bullets'))}
      {tool('Numbered list', on.numbers, () => run().toggleOrderedList().run(), icon('numbers'))}
      {tool('Quotation', on.quote, () => run().toggleBlockquote().run(), icon('quote'))}
      <Separator orientation="vertical" className="mx-1 h-5 border-l border-rule" />
      <LinkTool editor={editor} isOn={on.link} />
      <ToggleButton
        aria-label="Mention somebody of this workspace"
        isSelected={false}
        onChange={() =>
          run()
            .insertContent(needsSpace(editor) ? ' @' : '@')
            .run()
        }
        className={toolClass}
      >
        @
      </ToggleButton>
    </Toolbar>
  );
}

/** A mention begins after a space or at the start of a line. */
function needsSpace(editor: Editor): boolean {
  const { $from } = editor.state.selection;
  const before = $from.parent.textBetween(0, $from.parentOffset, undefined, ' ');
  return before !== '' && !before.endsWith(' ');
}

function LinkTool({ editor, isOn }: { editor: Editor; isOn: boolean }) {
  const [isOpen, setOpen] = useState(false);
  const [typed, setTyped] = useState('');
  const [error, setError] = useState<string>();
  const open = (next: boolean) => {
    if (next) {
      setTyped(String(editor.getAttributes('link').href ?? ''));
      setError(undefined);
    }
    setOpen(next);
  };
  const save = () => {
    const href = hrefFromTyping(typed);
    if (!href) {
      setError('Write a web address (https://…) or a mail address.');
      return;
    }
    const chain = editor.chain().focus().extendMarkRange('link');
    if (editor.state.selection.empty && !isOn) {
      chain.insertContent([
        { type: 'text', text: href.replace(/^mailto:/, ''), marks: [{ type: 'link', attrs: { href } }] },
        { type: 'text', text: ' ' },
      ]);
    } else chain.setLink({ href });
    chain.run();
    setOpen(false);
  };
  return (
    <DialogTrigger isOpen={isOpen} onOpenChange={open}>
      <ToggleButton aria-label="Link" isSelected={isOn} onChange={() => open(true)} className={toolClass}>
        {icon('link')}
      </ToggleButton>
      <Popover label="Link">
        <form
          className="flex w-72 max-w-full flex-col gap-3"
          onSubmit={(event) => {
            event.preventDefault();
            event.stopPropagation();
            save();
          }}
        >
          <TextField label="Address" value={typed} onChange={setTyped} error={error} autoFocus />
          <div className="flex justify-end gap-2">
            {isOn ? (
              <Button
                size="small"
                onPress={() => {
                  editor.chain().focus().extendMarkRange('link').unsetLink().run();
                  setOpen(false);
                }}
              >
                Take the link off
              </Button>
            ) : null}
            <Button size="small" variant="primary" type="submit">
              Link it
            </Button>
          </div>
        </form>
      </Popover>
    </DialogTrigger>
  );
}

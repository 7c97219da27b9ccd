'use client';

import { EditorContent, useEditor } from '@tiptap/react';
import { useEffect, useId, useRef, useState } from 'react';
import type { Mentionable } from './filter-people';
import type { NoteDocument } from './note-draft';
import { MentionList } from './mention-list';
import { MentionMenu } from './mention-menu';
import { pageNonce } from '../page-nonce';
import { noteExtensions } from './note-extensions';
import { NoteToolbar } from './note-toolbar';

export interface NoteEditorProps {
  /** Name of the text for screen readers, such as `Reply to A. Brandt`. */
  label: string;
  placeholder: string;
  people: readonly Mentionable[];
  /** The text to start from; taken over again when `generation` changes. */
  body: NoteDocument | null;
  generation: number;
  autoFocus?: boolean;
  onChange: (body: NoteDocument, isEmpty: boolean) => void;
  /** Ctrl or Cmd with Enter. */
  onSend: () => void;
  /** Escape, when no list is open. */
  onLeave?: () => void;
}

const textClass = [
  // The editor's own style sheet is not injected: the page's policy lets no script add one.
  'relative min-h-20 px-2.5 py-2 text-md outline-none sm:text-base wrap-anywhere whitespace-break-spaces',
  '[font-variant-ligatures:none] [&_.ProseMirror-separator]:inline! [&_.ProseMirror-trailingBreak]:inline',
  '[&_p]:min-h-[1lh] [&>*+*]:mt-1.5 [&_ul]:list-disc [&_ul]:pl-5 [&_ol]:list-decimal [&_ol]:pl-5',
  '[&_blockquote]:border-l-2 [&_blockquote]:border-edge [&_blockquote]:pl-3 [&_blockquote]:text-slate',
  '[&_strong]:font-semibold [&_a]:text-verdigris [&_a]:underline [&_a]:underline-offset-3',
  '[&_p.is-editor-empty:first-child]:before:pointer-events-none [&_p.is-editor-empty:first-child]:before:float-left',
  '[&_p.is-editor-empty:first-child]:before:h-0 [&_p.is-editor-empty:first-child]:before:text-slate',
  '[&_p.is-editor-empty:first-child]:before:content-[attr(data-placeholder)]',
].join(' ');

/** Rich text of one note: bold, italic, lists, quotations, links and mentions. */
export function NoteEditor(props: NoteEditorProps) {
  const { label, placeholder, people, body, generation, autoFocus } = props;
  const handlers = useRef(props);
  const hintId = useId();
  const listId = useId();
  const [menu] = useState(() => new MentionMenu(listId));
  const editor = useEditor({
    immediatelyRender: false,
    injectNonce: pageNonce(),
    shouldRerenderOnTransaction: false,
    injectCSS: false,
    autofocus: autoFocus ? 'end' : false,
    extensions: noteExtensions({ placeholder, suggestion: menu.suggestion }),
    content: body ?? undefined,
    editorProps: {
      attributes: {
        role: 'textbox',
        'aria-multiline': 'true',
        'aria-label': label,
        'aria-describedby': hintId,
        class: textClass,
      },
      handleKeyDown: (_view, event) => {
        if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) {
          handlers.current.onSend();
          return true;
        }
        if (event.key === 'Escape' && handlers.current.onLeave) {
          handlers.current.onLeave();
          return true;
        }
        return false;
      },
    },
    onUpdate: ({ editor: e }) => handlers.current.onChange(e.getJSON(), e.isEmpty),
  });

  useEffect(() => {
    handlers.current = props;
  });
  useEffect(() => menu.know(people), [menu, people]);
  const taken = useRef(generation);
  useEffect(() => {
    if (!editor || taken.current === generation) return;
    taken.current = generation;
    editor.commands.setContent(body ?? '', { emitUpdate: false });
  }, [editor, generation, body]);

  return (
    <div className="border border-edge bg-sheet focus-within:border-ink">
      {editor ? <NoteToolbar editor={editor} /> : <div className="h-9 border-b border-rule" />}
      <EditorContent editor={editor} className="max-h-80 overflow-y-auto" />
      <p id={hintId} className="sr-only">
        Control and Enter posts the note. An @ lists the people of this workspace.
      </p>
      <MentionList menu={menu} id={listId} />
    </div>
  );
}

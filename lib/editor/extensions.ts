import type { Extensions } from '@tiptap/core';
import Mention, { type MentionOptions } from '@tiptap/extension-mention';
import StarterKit from '@tiptap/starter-kit';
import { safeHref } from './safe-href';

/**
 * What a note may hold, for the browser's editor and the server's check alike: paragraphs, lists, quotes,
 * bold, italic, links, mentions. An editor adds its own suggestion list and placeholder.
 */
export function extensions(options: { mention?: Partial<MentionOptions> } = {}): Extensions {
  return [
    StarterKit.configure({
      heading: false,
      code: false,
      codeBlock: false,
      horizontalRule: false,
      strike: false,
      underline: false,
      dropcursor: false,
      gapcursor: false,
      trailingNode: false,
      link: {
        openOnClick: false,
        linkOnPaste: true,
        defaultProtocol: 'https',
        protocols: ['http', 'https', 'mailto'],
        isAllowedUri: (url) => safeHref(url) !== null,
      },
    }),
    Mention.configure(options.mention ?? {}),
  ];
}

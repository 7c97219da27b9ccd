import { renderJSONContentToReactElement, type JSONNodeType } from '@tiptap/static-renderer/json/react';
import { memo, type ReactNode } from 'react';
import { safeHref } from '@/lib/editor/safe-href';
import type { NoteDocument } from './note-draft';

type Part = { children?: ReactNode };
type NodePart = Part & { node: JSONNodeType };
type MarkPart = Part & { mark: { attrs?: Record<string, unknown> } };

const nodes: Record<string, (part: NodePart) => ReactNode> = {
  doc: ({ children }) => <>{children}</>,
  text: ({ node }) => node.text,
  paragraph: ({ children }) => <p className="min-h-[1lh]">{children}</p>,
  hardBreak: () => <br />,
  bulletList: ({ children }) => <ul className="list-disc pl-5">{children}</ul>,
  orderedList: ({ children, node }) => (
    <ol className="list-decimal pl-5" start={startOf(node)}>
      {children}
    </ol>
  ),
  listItem: ({ children }) => <li>{children}</li>,
  blockquote: ({ children }) => (
    <blockquote className="border-l-2 border-edge pl-3 text-slate">{children}</blockquote>
  ),
  mention: ({ node }) => (
    <span className="bg-verdigris-wash px-0.5 font-medium text-verdigris">
      @{String(node.attrs?.label ?? 'someone')}
    </span>
  ),
};

const marks: Record<string, (part: MarkPart) => ReactNode> = {
  bold: ({ children }) => <strong className="font-semibold">{children}</strong>,
  italic: ({ children }) => <em>{children}</em>,
  link: ({ children, mark }) => {
    const href = safeHref(mark.attrs?.href);
    if (!href) return <>{children}</>;
    return (
      <a
        href={href}
        target="_blank"
        rel="noopener noreferrer nofollow"
        className="text-verdigris underline underline-offset-3"
      >
        {children}
      </a>
    );
  },
};

function startOf(node: JSONNodeType): number | undefined {
  const start: unknown = node.attrs?.start;
  return typeof start === 'number' && Number.isInteger(start) ? start : undefined;
}

/** A note as React elements; what is not part of a note shows its words only, never markup. */
export const NoteBody = memo(function NoteBody({ body }: { body: NoteDocument }) {
  // Made anew for each body: the renderer counts its keys from the first call on.
  const render = renderJSONContentToReactElement({
    nodeMapping: nodes as never,
    markMapping: marks as never,
    unhandledNode: (({ children }: Part) => <>{children}</>) as never,
    unhandledMark: (({ children }: Part) => <>{children}</>) as never,
  });
  return (
    <div className="flex flex-col gap-1.5 text-base wrap-anywhere">
      {render({ content: body as JSONNodeType })}
    </div>
  );
});

import type { SuggestionProps } from '@tiptap/suggestion';
import { filterPeople, type Mentionable } from './filter-people';
import type { MentionSuggestion } from './note-extensions';

type Props = SuggestionProps<Mentionable, { id: string; label: string }>;

/** The list as it stands open: who fits, who Enter would take, and the element that floats at the caret. */
export interface OpenMention {
  people: readonly Mentionable[];
  active: number;
  host: HTMLElement;
}

/**
 * The list of people after an @. The caret stays in the text; arrows, Enter, Tab and Escape work the list, and
 * `aria-activedescendant` on the text names the one that Enter would take.
 */
export class MentionMenu {
  private people: readonly Mentionable[] = [];
  private props: Props | null = null;
  private open: OpenMention | null = null;
  private unmount: (() => void) | undefined;
  private readonly listeners = new Set<() => void>();

  /** @param listId id of the list's element, on which options are `<listId>-<index>` */
  constructor(private readonly listId: string) {}

  snapshot = (): OpenMention | null => this.open;

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => {
      this.listeners.delete(listener);
    };
  };

  know(people: readonly Mentionable[]): void {
    this.people = people;
  }

  take = (index: number): void => {
    const person = this.open?.people[index];
    if (person) this.props?.command({ id: person.id, label: person.name });
  };

  readonly suggestion: MentionSuggestion = {
    // Inside the page's landmark, so that screen readers find it where the text is.
    container: '#main',
    items: ({ query }) => filterPeople(this.people, query),
    command: ({ editor, range, props }) => {
      editor
        .chain()
        .focus()
        .insertContentAt(range, [
          { type: 'mention', attrs: { id: props.id, label: props.label } },
          { type: 'text', text: ' ' },
        ])
        .run();
    },
    render: () => ({
      onStart: (props) => {
        const host = document.createElement('div');
        host.className = 'z-50';
        this.unmount = props.mount(host);
        this.show(props, { people: props.items, active: 0, host });
      },
      onUpdate: (props) => {
        if (!this.open) return;
        const active = Math.min(this.open.active, Math.max(0, props.items.length - 1));
        this.show(props, { ...this.open, people: props.items, active });
      },
      onKeyDown: ({ event }) => this.press(event.key),
      onExit: (props) => {
        this.unmount?.();
        this.show(props, null);
      },
    }),
  };

  private press(key: string): boolean {
    const { open, props } = this;
    const count = open?.people.length ?? 0;
    if (!open || !props || count === 0) return false;
    if (key === 'Enter' || key === 'Tab') {
      this.take(open.active);
      return true;
    }
    const step = { ArrowDown: 1, ArrowUp: -1 }[key];
    if (!step) return false;
    this.show(props, { ...open, active: (open.active + step + count) % count });
    return true;
  }

  private show(props: Props, open: OpenMention | null): void {
    this.props = props;
    this.open = open;
    const text = props.editor.view.dom;
    if (open && open.people.length > 0) {
      text.setAttribute('aria-controls', this.listId);
      text.setAttribute('aria-activedescendant', `${this.listId}-${open.active}`);
    } else {
      text.removeAttribute('aria-controls');
      text.removeAttribute('aria-activedescendant');
    }
    this.listeners.forEach((listener) => listener());
  }
}

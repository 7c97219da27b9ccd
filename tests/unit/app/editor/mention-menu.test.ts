// @vitest-environment jsdom
import { Editor } from '@tiptap/core';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { MentionMenu } from '@/app/_components/note-editor/mention-menu';
import { noteExtensions } from '@/app/_components/note-editor/note-extensions';

const people = [
  { id: '0192f1c4-0000-7000-8000-0000000000a1', name: 'Mara Ferro', side: 'studio' as const },
  { id: '0192f1c4-0000-7000-8000-0000000000a2', name: 'Lewin Okafor', side: 'studio' as const },
  { id: '0192f1c4-0000-7000-8000-0000000000a3', name: 'Anselm Brandt', side: 'client' as const },
];

describe('the list of people after an @', () => {
  let editor: Editor;
  let menu: MentionMenu;

  beforeEach(() => {
    document.body.innerHTML = '<main id="main"><div id="text"></div></main>';
    menu = new MentionMenu('people');
    menu.know(people);
    editor = new Editor({
      element: document.getElementById('text'),
      injectCSS: false,
      extensions: noteExtensions({ placeholder: 'Write', suggestion: menu.suggestion }),
    });
  });
  afterEach(() => editor.destroy());

  const type = (text: string) => editor.commands.insertContent(text);
  const press = (key: string) =>
    editor.view.someProp('handleKeyDown', (handle) =>
      handle(editor.view, new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true })),
    );
  const names = () => menu.snapshot()?.people.map((person) => person.name);
  const openFor = async (text: string, expected: string[]) => {
    type(text);
    await vi.waitFor(() => expect(names()).toEqual(expected));
  };

  it('opens on an @, names the person whom Enter takes, and puts the mention into the text', async () => {
    await openFor('Thanks @', ['Mara Ferro', 'Lewin Okafor', 'Anselm Brandt']);
    expect(editor.view.dom.getAttribute('aria-controls')).toBe('people');
    expect(editor.view.dom.getAttribute('aria-activedescendant')).toBe('people-0');
    press('ArrowDown');
    expect(editor.view.dom.getAttribute('aria-activedescendant')).toBe('people-1');
    press('Enter');
    expect(JSON.stringify(editor.getJSON())).toContain(`"id":"${people[1].id}","label":"Lewin Okafor"`);
    await vi.waitFor(() => expect(menu.snapshot()).toBeNull());
    expect(editor.view.dom.hasAttribute('aria-activedescendant')).toBe(false);
  });

  it('goes round at both ends', async () => {
    await openFor('@', ['Mara Ferro', 'Lewin Okafor', 'Anselm Brandt']);
    press('ArrowUp');
    expect(menu.snapshot()?.active).toBe(2);
    press('ArrowDown');
    expect(menu.snapshot()?.active).toBe(0);
  });

  it('narrows with what is typed and keeps the choice inside the list', async () => {
    await openFor('@', ['Mara Ferro', 'Lewin Okafor', 'Anselm Brandt']);
    press('ArrowUp');
    await openFor('mar', ['Mara Ferro']);
    expect(menu.snapshot()?.active).toBe(0);
  });

  it('leaves Enter to the text when nobody fits', async () => {
    await openFor('@zzz', []);
    press('Enter');
    expect(editor.getJSON().content).toHaveLength(2);
    expect(editor.getText()).toContain('@zzz');
    expect(editor.view.dom.hasAttribute('aria-controls')).toBe(false);
  });
});

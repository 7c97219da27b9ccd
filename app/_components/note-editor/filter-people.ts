/** Somebody of this workspace who can be mentioned. */
export interface Mentionable {
  id: string;
  name: string;
  side: 'studio' | 'client';
}

const most = 8;

const plain = (text: string) =>
  text
    .normalize('NFD')
    .replace(/\p{Diacritic}/gu, '')
    .toLowerCase();

/** People whose name, or a word of it, begins with what was typed after the @; accents do not matter. */
export function filterPeople(people: readonly Mentionable[], query: string): Mentionable[] {
  const wanted = plain(query);
  return people
    .filter((person) => {
      const name = plain(person.name);
      return name.startsWith(wanted) || name.split(/[\s.-]+/).some((word) => word.startsWith(wanted));
    })
    .slice(0, most);
}

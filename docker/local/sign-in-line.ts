import type { Product } from './start-product';

/** One line with all that a newcomer needs: the address, the mail page, who can sign in. */
export function signInLine({
  baseUrl,
  mailUrl,
  people,
}: Pick<Product, 'baseUrl' | 'mailUrl' | 'people'>): string {
  const passwords = new Set(people.map((person) => person.password));
  const shared = passwords.size === 1;
  const names = people.map(
    ({ email, role, password }) => `${email} (${role}${shared ? '' : `, ${password}`})`,
  );
  const signIns = names.length > 0 ? ` | sign in as ${names.join(', ')}` : '';
  const password = shared ? ` with the password ${[...passwords][0]}` : '';
  return `Open ${baseUrl} | mail ${mailUrl}${signIns}${password}`;
}

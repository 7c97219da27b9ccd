/** Gates of the plan that a workspace begins with: their names are words of the trade, and no names in a sentence. */
const plain = ['Forming', 'Studio', 'Client'];

/** Whom a signature is for: `the client`, or the name that a lead gave the gate, as it was written. */
export const gateInWords = (name: string): string =>
  plain.includes(name) ? `the ${name.toLowerCase()}` : name;

/** `the client gate`, or `the gate Tooling`. */
export const theGate = (name: string): string =>
  plain.includes(name) ? `the ${name.toLowerCase()} gate` : `the gate ${name}`;

/** One mail in plain words; text and HTML are both made from this, so that they say the same. */
export type MailContent = {
  subject: string;
  /** First line of the body, larger. */
  heading: string;
  /** Shown by mail lists after the subject. */
  preview: string;
  paragraphs: string[];
  /** Words of a person, set apart and never changed. */
  quote?: { by: string; text: string };
  /** A small table, label and value; `code` sets digests in the figure type. */
  facts: { label: string; value: string; code?: boolean }[];
  action?: { label: string; url: string };
  cautions?: string[];
  /** Why this mail came. */
  footer: string;
};

/** The template and revision that a mail speaks of, as written in subjects: `QUI-004 B`. */
export const revisionName = ({ number, letter }: { number: string; letter: string }) => `${number} ${letter}`;

/** Keeps words of people from breaking a header or a line: one line, at most `most` characters. */
export function oneLine(text: string, most = 120): string {
  const line = text.replace(/\s+/g, ' ').trim();
  return line.length > most ? `${line.slice(0, most - 1).trimEnd()}…` : line;
}

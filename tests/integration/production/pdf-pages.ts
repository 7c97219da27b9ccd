import { readFile } from 'node:fs/promises';
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';

/** The text of a PDF, page by page, as a reader's program finds it. */
export async function pdfPages(path: string): Promise<string[]> {
  const pdf = await getDocument({ data: new Uint8Array(await readFile(path)), verbosity: 0 }).promise;
  const pages: string[] = [];
  for (let number = 1; number <= pdf.numPages; number++) {
    const { items } = await (await pdf.getPage(number)).getTextContent();
    const text = items.map((item) => ('str' in item ? item.str + (item.hasEOL ? ' ' : '') : ''));
    pages.push(text.join('').replace(/\s+/g, ' '));
  }
  await pdf.destroy();
  return pages;
}

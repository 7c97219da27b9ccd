/** A cell as it is printed: its words, and the ends and middle of the range that it gives. */
export interface Cell {
  text: string;
  range: [number, number];
  middle: number;
}

/** Rows of a table written with bars, its first line the names of its columns: `95–100`, `-10 to 0` or `127`. */
export function readTable(text: string): Record<string, Cell>[] {
  const [names, ...rows] = text
    .trim()
    .split('\n')
    .map((line) => line.split('|').map((cell) => cell.trim()));
  return rows.map((row) => Object.fromEntries(row.map((cell, column) => [names[column], readCell(cell)])));
}

function readCell(text: string): Cell {
  const ends = text.split(/–| to /).map(Number);
  const range: [number, number] = [ends[0], ends[ends.length - 1]];
  return { text, range, middle: (range[0] + range[1]) / 2 };
}

import type { StageColours } from './template-material';

/** The page's colour tokens as they stand on an element; what is lit is mixed from them for the theme. */
export function readStageColours(element: HTMLElement): StageColours {
  const style = getComputedStyle(element);
  const token = (name: string, otherwise: string) => style.getPropertyValue(`--${name}`).trim() || otherwise;
  const dark = style.colorScheme.includes('dark');
  return {
    hatch: dark ? token('ink', '#ece8de') : token('sheet', '#fefdfa'),
    ink: token('ink', '#1d2321'),
    madder: token('madder', '#a2352b'),
    clayLight: dark ? '#8d8b81' : '#f1ecdf',
    clayDark: dark ? '#3b413e' : '#9a9587',
  };
}

import { expect, it } from 'vitest';
import { asSentence, sentenceCase } from '@/app/_components/sentence-case';

it('begins with a capital, but leaves a name as it is written', () => {
  expect(sentenceCase('the file is a short text')).toBe('The file is a short text');
  expect(sentenceCase('tray.stl arrived with 3 of 9 bytes.', 'tray.stl')).toBe(
    'tray.stl arrived with 3 of 9 bytes.',
  );
  expect(sentenceCase('')).toBe('');
});

it('ends a sentence once', () => {
  expect(asSentence('the header says 12 facets; export it again')).toBe(
    'The header says 12 facets; export it again.',
  );
  expect(asSentence('It is empty. ')).toBe('It is empty.');
});

import { dictionary } from '@zxcvbn-ts/language-common';
import { describe, expect, it } from 'vitest';
import { passwordLength, passwordMin } from '@/lib/auth/password-rules';
import { refuseWeak, weakness } from '@/lib/auth/weak-password';

const owner = { name: 'Una Nováková', email: 'una.novak@quillon.example' };
const random = '7Kq-z_Vw2rTgYx9L';

describe('a password that may be chosen', () => {
  it.each([
    'eleven grey gulls over a harbour',
    'correct horse battery staple',
    'purple-harbour-41-oats',
    'sechs alte Öfen im Schuppen',
    'пять серых чаек над морем',
    '港の上を飛ぶ五羽の灰色カモメたち',
    '🦆 five grey gulls 🌊🌊',
    'allsmallletterswithoutanything',
    '830274917264058',
    '               x y z q w v k', // blanks count like any other character
    random,
    `${'a'.repeat(60)}${'k3#Vq9!mZx2@Lp7$'.repeat(3)}`,
  ])('%s', async (password) => {
    expect(await weakness(password, owner)).toBeNull();
  });

  it('has 15 to 128 characters of any kind', async () => {
    const of = (length: number) =>
      'five grey gulls over a very old harbour wall '
        .repeat(3)
        .slice(0, length)
        .trimEnd()
        .padEnd(length, 'q');
    const fits = async (length: number) => (await weakness(of(length), owner)) === null;
    expect([await fits(7), await fits(8), await fits(14)]).toEqual([false, false, false]);
    expect([await fits(15), await fits(64), await fits(128), await fits(129)]).toEqual([
      true,
      true,
      true,
      false,
    ]);
  });
});

describe('a password that may not', () => {
  it('is any of the 3,000 most common ones, and made long by repeating them neither', async () => {
    const common = (dictionary['passwords-common'] as string[]).slice(0, 3000);
    expect(common).toHaveLength(3000);
    const taken: string[] = [];
    for (const [i, password] of common.entries()) {
      if ((await weakness(password, owner)) === null) taken.push(password);
      const times = Math.ceil(passwordMin / passwordLength(password));
      if (i % 60 === 0 && (await weakness(password.repeat(times), owner)) === null) taken.push(password);
    }
    expect(taken).toEqual([]);
  });

  it.each([
    'passwordpassword',
    'password12345678',
    'P@ssw0rd!P@ssw0rd!',
    '123456789012345',
    'qwertyuiopasdfgh',
    'qazwsxedcrfvtgb',
    'aaaaaaaaaaaaaaaa',
    'abcabcabcabcabc',
    'abcdefghijklmnop',
    'iloveyou iloveyou',
    'monkeydragonmaster',
    'summer2024summer',
    'letmeinletmeinplease',
  ])('is on the lists or made of them: %s', async (password) => {
    expect(await weakness(password, owner)).toMatch(/common/);
  });

  it.each([
    'Firstpull-Novak-1999',
    'una.novak@quillon.example',
    'Una Nováková 1984!!',
    'NovakFirstpullUna7',
    'firstpull password 1',
  ])('is made of the account’s own words: %s', async (password) => {
    expect(await weakness(password, owner)).toMatch(/name|common/);
  });

  it('is only so for whom the words are their own', async () => {
    const password = 'kestrelwitherspoon 77';
    const of = { name: 'Ada Witherspoon', email: 'kestrel@example.test' };
    expect(await weakness(password, owner)).toBeNull();
    expect(await weakness(password, of)).toMatch(/name|common/);
  });

  it('is told to the identity service with its sentence', async () => {
    await expect(refuseWeak('passwordpassword', owner)).rejects.toMatchObject({
      status: 'BAD_REQUEST',
      body: { code: 'WEAK_PASSWORD', message: expect.stringContaining('common') },
    });
    await expect(refuseWeak(['not', 'text'], owner)).resolves.toBeUndefined();
  });
});

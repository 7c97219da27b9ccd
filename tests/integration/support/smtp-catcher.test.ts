import { createTransport } from 'nodemailer';
import { describe, expect, it } from 'vitest';
import { freshSmtpCatcher } from '../../support/database';

const catcher = await freshSmtpCatcher();
const transport = createTransport(process.env.SMTP_URL!);
const letter = (to: string, subject: string) =>
  transport.sendMail({ from: 'Firstpull <no-reply@firstpull.example>', to, subject, text: `for ${to} – ü` });

describe('the mail catcher', () => {
  it('keeps what was sent, to whom, in order', async () => {
    await letter('ada@studio.example', 'First');
    await letter('bo@client.example', 'Second');
    expect(catcher.mails.map(({ to, subject }) => [...to, subject])).toEqual([
      ['ada@studio.example', 'First'],
      ['bo@client.example', 'Second'],
    ]);
    expect(catcher.mails[0]).toMatchObject({
      from: 'no-reply@firstpull.example',
      text: 'for ada@studio.example – ü\n',
    });
  });

  it('waits for a mail yet to come', async () => {
    const later = catcher.next(({ subject }) => subject === 'Third');
    await letter('ada@studio.example', 'Third');
    expect((await later).to).toEqual(['ada@studio.example']);
  });

  it('says what it caught when the awaited mail does not come', async () => {
    await expect(catcher.next(({ subject }) => subject === 'Never', 10)).rejects.toThrow(
      'ada@studio.example: First',
    );
  });

  it('refuses when it is told to', async () => {
    catcher.refuseWith(451);
    await expect(letter('ada@studio.example', 'Refused')).rejects.toMatchObject({ responseCode: 451 });
    catcher.refuseWith(null);
    await letter('ada@studio.example', 'Taken');
    expect(catcher.mails.map(({ subject }) => subject)).not.toContain('Refused');
  });
});

import { describe, expect, it } from 'vitest';
import { mailRequest, type MailRequest } from '@/lib/mail/messages';
import { renderMail } from '@/lib/mail/render/render-mail';

const origin = 'https://proofs.example';
const hostile = '<script>alert(1)</script> & "quoted" \u2028\r\nBcc: everybody@example.test';
const member = {
  personId: '01890000-0000-7000-8000-000000000001',
  email: 'ada@example.test',
  name: 'Ada Lindqvist',
};
const revision = {
  workspaceId: '01890000-0000-7000-8000-000000000002',
  workspaceName: `Quillon ${hostile}`,
  number: 'QLN-007',
  title: `Tart tray ${hostile}`,
  letter: 'B',
  path: '/w/quillon/templates/01890000-0000-7000-8000-000000000003/B',
};

/** One of each, with as hostile words as people may type. */
const all: { [T in MailRequest['template']]: Extract<MailRequest, { template: T }> } = {
  'verify-address': {
    template: 'verify-address',
    to: member,
    url: `${origin}/api/auth/verify-email?token=a.b`,
  },
  'reset-password': {
    template: 'reset-password',
    to: member,
    url: `${origin}/api/auth/reset-password/token`,
  },
  'second-factor': { template: 'second-factor', to: member, what: 'code-spent', codesLeft: 9 },
  invitation: {
    template: 'invitation',
    to: member,
    inviterName: hostile,
    studioName: hostile,
    workspaceName: hostile,
    role: 'approver',
    path: '/join/01890000-0000-7000-8000-000000000004.token',
    expiresAt: '2026-12-08T10:00:00.000Z',
  },
  'revision-posted': {
    template: 'revision-posted',
    to: member,
    ...revision,
    authorName: hostile,
    note: hostile,
    replaces: 'A',
  },
  'revision-checked': {
    template: 'revision-checked',
    to: member,
    ...revision,
    authorName: hostile,
    note: hostile,
    look: 2,
    waived: 1,
    notRun: 1,
  },
  'check-fails': {
    template: 'check-fails',
    to: member,
    ...revision,
    failing: [{ check: 'Draft', remedy: hostile }],
  },
  'check-given-up': { template: 'check-given-up', to: member, ...revision, reason: hostile },
  'revision-withdrawn': {
    template: 'revision-withdrawn',
    to: member,
    ...revision,
    printedName: hostile,
    reason: hostile,
  },
  'gate-waits': {
    template: 'gate-waits',
    to: member,
    ...revision,
    gateName: hostile,
    openItems: 2,
    dueOn: '2026-10-25',
  },
  'gate-due': {
    template: 'gate-due',
    to: member,
    ...revision,
    gateName: hostile,
    dueOn: '2026-10-25',
    when: 'tomorrow',
    openItems: 1,
    standsFor: hostile,
  },
  'gate-short': {
    template: 'gate-short',
    to: member,
    ...revision,
    gateName: hostile,
    needed: 2,
    have: 0,
    left: 1,
  },
  'stand-in-named': {
    template: 'stand-in-named',
    to: member,
    workspaceId: revision.workspaceId,
    workspaceName: revision.workspaceName,
    path: '/w/quillon/gate-plan',
    awayName: hostile,
    fromOn: '2026-10-25',
    untilOn: '2026-11-01',
  },
  'note-posted': {
    template: 'note-posted',
    to: member,
    ...revision,
    authorName: hostile,
    text: hostile,
    mentioned: true,
  },
  'revision-signed': {
    template: 'revision-signed',
    to: member,
    ...revision,
    printedName: hostile,
    role: 'approver',
    meaning: hostile,
    signedAt: '2026-10-25T00:30:10.000Z',
    timeZone: 'Europe/Berlin',
    digest: 'ab'.repeat(32),
    signedFor: hostile,
    locked: true,
  },
  'revision-returned': {
    template: 'revision-returned',
    to: member,
    ...revision,
    printedName: hostile,
    role: 'approver',
    reason: hostile,
  },
  'revision-released': {
    template: 'revision-released',
    to: member,
    ...revision,
    printedName: hostile,
    note: hostile,
    digest: 'cd'.repeat(32),
  },
  'revision-recalled': {
    template: 'revision-recalled',
    to: member,
    ...revision,
    printedName: hostile,
    reason: hostile,
  },
  'revision-retired': {
    template: 'revision-retired',
    to: member,
    ...revision,
    printedName: hostile,
    reason: hostile,
  },
};

/** What a reader of the HTML part sees. */
const visible = (html: string) =>
  html
    .replace(/<head>.*<\/head>/s, '')
    .replace(/<br>/g, ' ')
    .replace(/<[^>]+>/g, ' ')
    .replace(/&#(\d+);/g, (_, code) => String.fromCharCode(Number(code)))
    .replace(/\s+/g, ' ');

describe.each(Object.values(all))('$template', (request) => {
  const { subject, text, html } = renderMail(mailRequest.parse(request), origin);

  it('has a subject of one line that fits', () => {
    expect(subject).not.toMatch(/[\r\n\u2028]/);
    expect(subject.length).toBeGreaterThan(10);
    expect(subject.length).toBeLessThanOrEqual(120);
    if ('letter' in request) expect(subject.startsWith('QLN-007 B ')).toBe(true);
  });

  it('says the same as text and as HTML', () => {
    const flat = text.replace(/\s+/g, ' ');
    const seen = visible(html);
    const words = text
      .replace(/-{10,}/g, ' ')
      .split(/\s+/)
      .map((word) => word.replace(/:$/, ''));
    for (const word of words.filter((part) => /^[\w.,:/-]{3,}$/.test(part))) expect(seen).toContain(word);
    expect(flat).toContain('Firstpull');
  });

  it('shows hostile words as words', () => {
    expect(html).not.toContain('<script');
    expect(html).not.toMatch(/<img|<link|url\(|@import|src=/);
    if ('printedName' in request || 'authorName' in request || 'inviterName' in request)
      expect(visible(html)).toContain('<script>alert(1)</script>');
  });

  it('links to our own host only, absolutely, and by one action', () => {
    const links = [...html.matchAll(/href="([^"]*)"/g)].map(([, href]) =>
      href.replace(/&#(\d+);/g, (_, code) => String.fromCharCode(Number(code))),
    );
    expect(new Set(links).size).toBe(1);
    for (const link of links) expect(new URL(link).origin).toBe(origin);
    expect(text).toContain(links[0]);
  });

  it('is small, and names its language', () => {
    expect(Buffer.byteLength(html)).toBeLessThan(100_000);
    expect(html).toContain('<html lang="en">');
    expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThan(200);
  });
});

it('every template of the union is rendered here', () => {
  expect(Object.keys(all).sort()).toEqual(
    mailRequest.options.map((option) => option.shape.template.value).sort(),
  );
});

it('a signature shows its local time with offset and zone', () => {
  const { text, html } = renderMail(all['revision-signed'], origin);
  expect(text).toContain('25 Oct 2026, 02:30:10 CEST (UTC+02:00, Europe/Berlin)');
  expect(visible(html)).toContain('25 Oct 2026, 02:30:10 CEST (UTC+02:00, Europe/Berlin)');
  expect(text).toContain('ab'.repeat(32));
});

it.each([
  [0, 0, 0, 'Nothing that was checked stands against forming it.'],
  [0, 0, 1, 'Nothing that was checked stands against forming it. One check was not run.'],
  [
    1,
    0,
    2,
    'Nothing that was checked keeps it from forming; one finding is left to look at. 2 checks were not run.',
  ],
  [
    2,
    1,
    1,
    'The studio has let one failing finding stand; the reason is on the revision’s page. 2 more findings are left to look at. One check was not run.',
  ],
])(
  'a client is told no more than was checked: %i to look at, %i waived, %i not run',
  (look, waived, notRun, words) => {
    const { text } = renderMail({ ...all['revision-checked'], look, waived, notRun }, origin);
    expect(text.replace(/\s+/g, ' ')).toContain(`${words} Turn the model`);
    expect(text).not.toContain('The check found nothing');
  },
);

it('a mail queued before checks not run were counted still goes out', () => {
  const { notRun: _, ...older } = all['revision-checked'];
  expect(mailRequest.parse(older)).toMatchObject({ template: 'revision-checked', notRun: 0 });
});

it.each(['revision-released', 'revision-recalled'] as const)('%s names the cautions', (template) => {
  const { text } = renderMail(all[template], origin);
  expect(text).toMatch(/Hot sheet/);
  expect(text).toMatch(/Compressed air/);
});

it('a second factor that somebody else set up is nothing that a new password mends', () => {
  const text = (what: 'on' | 'off') =>
    renderMail({ ...all['second-factor'], what }, origin).text.replace(/\s+/g, ' ');
  expect(text('on')).toContain('tell a lead of the studio at once');
  expect(text('off')).toContain('set a new password now');
});

it('a gate that has its names, but not under what stands there now, says so', () => {
  const text = (held: boolean) =>
    renderMail({ ...all['gate-short'], held }, origin).text.replace(/\s+/g, ' ');
  expect(text(true)).toContain('nobody has signed what stands there now');
  expect(text(false)).toContain('The gate asks for 2 signatures and has none, but one person is left');
});

it('a path that leads elsewhere is refused', () => {
  const away = { ...all['gate-waits'], path: '//elsewhere.example/x' };
  expect(() => renderMail(away, origin)).toThrow(/our own host/);
});

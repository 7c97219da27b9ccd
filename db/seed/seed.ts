import { closeDatabases } from '@/db/client';
import { enterWorkspace } from '@/lib/auth/enter';
import { stopBoss } from '@/lib/jobs/boss';
import { releaseRevision } from '@/lib/production/release-revision';
import { settleThread } from '@/lib/review/settle-thread';
import { viewDocket } from '@/lib/review/view-docket';
import { newTemplate, paragraph, post, raise, reply, sign, waiveFailing } from './acts';
import { makePeople, openHouse, type Cast, type DemoSignIn } from './people';
import { bonbonMould, bottleCradle, giftCover, seedlingInsert, tartTray } from './templates';

type Rooms = { quillon: string; tamsin: string };

/**
 * Fills an empty database with the demo studio. A worker must be running: the files are read and the
 * revisions checked for real. Everything in it is invented.
 * @returns who can sign in, with passwords made for this database
 */
export async function seedDemo(): Promise<DemoSignIn[]> {
  const { people, signIns } = await makePeople();
  const rooms = await openHouse(people);
  await releasedTray(people, rooms);
  await mouldInReview(people, rooms);
  await coverThatLocks(people, rooms);
  await shellThatWaits(people, rooms);
  await approvedCradle(people, rooms);
  await stopBoss();
  await closeDatabases();
  return signIns;
}

const at = (people: Cast, room: string) => ({
  ferro: () => enterWorkspace(people.ferro, room),
  okafor: () => enterWorkspace(people.okafor, room),
  halvorsen: () => enterWorkspace(people.halvorsen, room),
  brandt: () => enterWorkspace(people.brandt, room),
  duarte: () => enterWorkspace(people.duarte, room),
  valcourt: () => enterWorkspace(people.valcourt, room),
});

/** Revision A has too little draft and webs between its cups; B is right, signed by studio and client, and released. */
async function releasedTray(people: Cast, rooms: Rooms): Promise<void> {
  const who = at(people, rooms.quillon);
  const template = await newTemplate(await who.ferro(), 'Tart tray, six cup', 12);
  const first = await post(await who.ferro(), template, {
    file: 'tart-tray-a.stl',
    bytes: await tartTray({ draftDeg: 2, ventMm: 1, footMm: 0, pitchMm: 74 }),
    note: 'First state. The cups follow your drawing exactly.',
  });
  const draftFinding = (await viewDocket(await who.brandt(), first)).findings.find(
    (f) => f.checkId === 'draft',
  );
  const thread = await raise(
    await who.brandt(),
    first,
    paragraph('Does this mean that the cups cannot be straight? We like them steep.'),
    { findingId: draftFinding?.id },
  );
  await reply(
    await who.ferro(),
    thread,
    paragraph('They will lock on the template at 2°. At 9° the foot grows by 3 mm; I post that as B, ', {
      text: '',
      mention: { id: people.brandt.id, name: people.brandt.name },
    }),
  );
  const second = await post(await who.ferro(), template, {
    file: 'tart-tray-b.stl',
    bytes: await tartTray({ draftDeg: 9, ventMm: 1 }),
    note: 'Cups at 9° so that the tray lifts off, 10 mm further apart and rounded at the foot so that the sheet closes between them. Same rim height. Sheet of 1 mm.',
    recipe: { print: { layerMm: 0.12, sanded: true }, sheet: { gaugeMm: 1 } },
  });
  await settleThread(await who.brandt(), thread, {
    settled: true,
    version: await threadVersion(await who.brandt(), second, thread),
  });
  await sign(await who.okafor(), second, people.okafor.password);
  await sign(await who.brandt(), second, people.brandt.password);
  await releaseRevision(await who.halvorsen(), second, {
    note: 'One copy, sanded, for a first run of 50 pulls.',
  });
}

async function threadVersion(ctx: Parameters<typeof viewDocket>[0], revisionId: string, threadId: string) {
  const thread = (await viewDocket(ctx, revisionId)).threads.find((t) => t.id === threadId);
  if (!thread) throw new Error('the thread did not travel to the new revision');
  return thread.version;
}

/** Half of the pockets have no vent: the docket is open, client and studio talk. */
async function mouldInReview(people: Cast, rooms: Rooms): Promise<void> {
  const who = at(people, rooms.quillon);
  const template = await newTemplate(await who.ferro(), 'Bonbon mould, 24 pockets', 5);
  const revision = await post(await who.ferro(), template, {
    file: 'bonbon-mould-a.stl',
    bytes: await bonbonMould({ ventedRows: 2, ventMm: 1 }),
    note: 'Please look at the spacing of the pockets, and whether 11 mm is deep enough. Sheet of 1.2 mm; 0.2 mm is enough for a mould.',
    recipe: { print: { layerMm: 0.12, sanded: true }, sheet: { gaugeMm: 1.2, minFormedMm: 0.2 } },
  });
  const thread = await raise(
    await who.duarte(),
    revision,
    paragraph(
      'Our logo goes on the flat between the second and third row. It needs 6 mm of clear flat all round.',
    ),
    { pin: { at: [0, 0, 24], normal: [0, 0, 1], view: null }, mustSettle: true },
  );
  await reply(
    await who.ferro(),
    thread,
    paragraph('There are 8 mm between the rims now. Is the logo 20 mm wide or less?'),
  );
  await raise(
    await who.brandt(),
    revision,
    paragraph(
      'Depth is fine for us. ',
      { text: '', mention: { id: people.ferro.id, name: people.ferro.name } },
      ' when could we have a test pull?',
    ),
  );
}

/** A snap lip locks the part: the check run fails and nothing is signed. */
async function coverThatLocks(people: Cast, rooms: Rooms): Promise<void> {
  const who = at(people, rooms.quillon);
  const template = await newTemplate(await who.ferro(), 'Gift box cover', 20);
  await post(await who.ferro(), template, {
    file: 'gift-cover-a.stl',
    bytes: await giftCover({ lipMm: 2.5, draftDeg: 3 }),
    note: 'With the snap lip that you asked for.',
  });
}

/** A thin hollow shell: signed by the studio, waits for the client. */
async function shellThatWaits(people: Cast, rooms: Rooms): Promise<void> {
  const who = at(people, rooms.tamsin);
  const template = await newTemplate(await who.ferro(), 'Seedling insert', 3);
  const revision = await post(await who.ferro(), template, {
    file: 'seedling-insert-a.stl',
    bytes: await seedlingInsert({ wallMm: 3.5 }),
    note: 'Hollow to save filament. Will it be stiff enough?',
    recipe: {
      print: { layerMm: 0.12, sanded: true, shellMm: 3.5, topMm: 3.5 },
      sheet: { gaugeMm: 1.2, minFormedMm: 0.2 },
    },
  });
  await raise(
    await who.okafor(),
    revision,
    paragraph('We will prove the wall on one pull before the run of fifty.'),
  );
  // What the check says of its thin walls is the lead's to let stand, and to answer for.
  await waiveFailing(
    await who.okafor(),
    revision,
    'Proven on one pull before the run of fifty; ribs if it gives.',
  );
  await sign(await who.okafor(), revision, people.okafor.password);
}

/** Agreed and locked, waits for production. */
async function approvedCradle(people: Cast, rooms: Rooms): Promise<void> {
  const who = at(people, rooms.tamsin);
  const template = await newTemplate(await who.ferro(), 'Bottle cradle, three', 9);
  const revision = await post(await who.ferro(), template, {
    file: 'bottle-cradle-a.stl',
    bytes: await bottleCradle(),
    note: 'Troughs for 34 mm bottles, open at both ends.',
    recipe: { print: { layerMm: 0.12, sanded: true }, sheet: { gaugeMm: 1.2 } },
  });
  await sign(await who.okafor(), revision, people.okafor.password);
  await sign(await who.valcourt(), revision, people.valcourt.password);
}

import { hideFrames } from '../../api/features/frames/change-frames.ts';
import { openLink } from '../../api/features/guests/open-link.ts';
import { bringFiles, framesByName } from './bring-files.ts';
import { begin, filesOf, hang, stems } from './commission.ts';
import { deliver, fetchEverything, fetchFile, openDelivery } from './delivering.ts';
import { letTimePass } from './let-time-pass.ts';
import { tokenFor } from './mailed-token.ts';
import { architects, council, harbourTrust, visit } from './people.ts';
import { draftSheet, mark, openToGuests, sendPicks } from './proofing.ts';
import { assignments } from '../scenes/takes.ts';
import type { Stage } from './stage.ts';

const DAY = 24;

/** Delivered: picks sent, finals with versions, archives built, and downloads in the record. */
export async function skylineDelivered(stage: Stage, clientId: string): Promise<void> {
  const { halina, emeric } = council.people;
  const id = await begin(stage, {
    clientId,
    title: 'Skyline for the annual report',
    brief: 'Five pictures of the city from the water and from above for the report and its cover. Calm, no cranes in the foreground.',
    allowance: 5,
    extraPrice: 9500,
    shotDaysAgo: assignments.skyline.daysAgo,
    dueInDays: -9,
    views: [
      ['Across the harbour, morning', 'Double page, room for the title above the roofs.'],
      ['Across the harbour, after sunset', 'Cover.'],
      ['Towers through a long lens', ''],
      ['Over the roofs of the old town', 'With the Corn Exchange.'],
    ],
  });
  await bringFiles(stage, stage.owner, id, filesOf(stage, 'skyline', false), 'frame');
  await hang(stage, id, [stems(183, 184), [...stems(188, 191), ...stems(193, 195)], stems(187), stems(192)]);
  await letTimePass(stage.ctx.knex, id, 3 * DAY);
  const sheet = await draftSheet(stage, id, [...stems(183, 188), ...stems(191, 193)], 12);
  const tokens = await openToGuests(stage, sheet, halina, [emeric], 'Nine to choose from; five are included.');
  await letTimePass(stage.ctx.knex, id, 2 * DAY);
  for (const { email } of [halina, emeric]) await openLink(stage.ctx, tokenFor(tokens, email));
  await mark(stage, sheet, emeric, [...stems(183), ...stems(186, 188)]);
  await mark(stage, sheet, halina, [...stems(183), ...stems(187, 188), ...stems(192, 193)]);
  await letTimePass(stage.ctx.knex, id, 5);
  await sendPicks(stage, sheet, halina, 'The dusk one becomes the cover. Please keep some air above the tower.');
  await letTimePass(stage.ctx.knex, id, 8 * DAY);
  // The second version of the cover comes after the first one, as a version of the same final.
  const finals = filesOf(stage, 'skyline', true);
  await bringFiles(stage, stage.assistant, id, finals.filter(({ name }) => !name.includes('-v2')), 'final'); // prettier-ignore
  await letTimePass(stage.ctx.knex, id, 1 * DAY);
  await bringFiles(stage, stage.assistant, id, finals.filter(({ name }) => name.includes('-v2')), 'final'); // prettier-ignore
  await letTimePass(stage.ctx.knex, id, 3);
  const delivery = await deliver(
    stage,
    id,
    [halina, emeric],
    'Here they are, at full resolution. The cover is a little warmer than in the proof.',
  );
  await letTimePass(stage.ctx.knex, id, 2 * DAY);
  await openDelivery(stage, delivery, halina);
  await fetchEverything(stage, delivery, halina);
  await openDelivery(stage, delivery, emeric);
  await fetchFile(stage, delivery, emeric, 'HL_0188', 1);
  await fetchFile(stage, delivery, emeric, 'HL_0187', 0.4);
  await letTimePass(stage.ctx.knex, id, 5 * DAY);
}

/** Picks in: the lead has sent, with one extra; retouching has not begun. */
export async function exchangePicked(stage: Stage, clientId: string): Promise<void> {
  const { dorian, lotte } = visit.people;
  const id = await begin(stage, {
    clientId,
    title: 'Corn Exchange relighting',
    brief: 'The new lighting of the Corn Exchange and its square for the winter campaign: at the blue hour, and wet if the weather helps.',
    allowance: 3,
    extraPrice: 8500,
    shotDaysAgo: assignments.exchange.daysAgo,
    dueInDays: 6,
    views: [
      ['The front on the centre line, lamps lit', 'Hero; no cars.'],
      ['The square at night', 'After rain, people welcome.'],
      ['By day, for comparison', ''],
    ],
  });
  await bringFiles(stage, stage.assistant, id, filesOf(stage, 'exchange', false), 'frame');
  await hang(stage, id, [stems(269, 271), stems(272, 275), stems(266)]);
  await letTimePass(stage.ctx.knex, id, 4 * DAY);
  const sheet = await draftSheet(stage, id, [...stems(266, 269), ...stems(272), ...stems(275)], 8);
  const tokens = await openToGuests(stage, sheet, dorian, [lotte], 'Six proofs, three are included.');
  await letTimePass(stage.ctx.knex, id, 3 * DAY);
  for (const { email } of [dorian, lotte]) await openLink(stage.ctx, tokenFor(tokens, email));
  await mark(stage, sheet, lotte, [...stems(267), ...stems(269), ...stems(272)]);
  await mark(stage, sheet, dorian, [...stems(266), ...stems(269), ...stems(272), ...stems(275)]);
  await letTimePass(stage.ctx.knex, id, 1 * DAY);
  await sendPicks(stage, sheet, dorian, 'One more than agreed: the lane after rain is too good to leave.');
  await letTimePass(stage.ctx.knex, id, 2);
}

/** With the client: the sheet is open, two people have marked. Returns the lead's link. */
export async function bridgesOut(stage: Stage, clientId: string): Promise<string> {
  const { runa, piet, saskia } = harbourTrust.people;
  const id = await begin(stage, {
    clientId,
    title: 'Basin bridges',
    brief: 'The three bridges of the basin after the works: each by itself, and one picture with all of them.',
    allowance: 5,
    extraPrice: 8500,
    shotDaysAgo: assignments.bridges.daysAgo,
    dueInDays: 16,
    views: [
      ['Old Basin Bridge from the water', 'Dawn or dusk, lamps on.'],
      ['Swing Bridge', 'With the control cabin.'],
      ['The Needle', 'On the deck, one figure; and the mast against the sky.'],
      ['All three in one picture', 'Long lens.'],
    ],
  });
  await bringFiles(stage, stage.assistant, id, filesOf(stage, 'bridges', false), 'frame');
  await hang(stage, id, [[...stems(331, 333), ...stems(342, 346)], stems(337, 339), [...stems(334, 336), ...stems(341)], stems(340)]);
  await letTimePass(stage.ctx.knex, id, 2 * DAY);
  const chosen = [...stems(331), ...stems(334), ...stems(337), ...stems(339, 341), ...stems(344, 345)];
  const sheet = await draftSheet(stage, id, chosen, 4);
  const words = 'The proofs of the basin. Five are included; please choose in time.';
  const tokens = await openToGuests(stage, sheet, runa, [piet, saskia], words);
  await letTimePass(stage.ctx.knex, id, 3 * DAY);
  for (const { email } of [runa, piet]) await openLink(stage.ctx, tokenFor(tokens, email));
  await mark(stage, sheet, piet, [...stems(331), ...stems(339), ...stems(341)]);
  await letTimePass(stage.ctx.knex, id, 20);
  await mark(stage, sheet, runa, [...stems(331), ...stems(334), ...stems(344)]);
  await letTimePass(stage.ctx.knex, id, 1);
  return `/open/${tokenFor(tokens, runa.email)}`;
}

/** Being prepared: frames are in, some hang under views, a draft of the sheet lies ready. */
export async function libraryPreparing(stage: Stage, clientId: string): Promise<void> {
  const id = await begin(stage, {
    clientId,
    title: 'Ropewalk Library, first light to last',
    brief: `${architects.people.ines.name} would like the library as it lives through a day: the oriel, the three gables, and the quay before it.`,
    allowance: 6,
    extraPrice: 8500,
    shotDaysAgo: assignments.library.daysAgo,
    dueInDays: 24,
    views: [
      ['East front across the basin', 'Hero for the opening, landscape, room for a headline.'],
      ['Approach on the centre line', 'Symmetrical, one figure if possible.'],
      ['The oriel', 'Straight on; and from below.'],
      ['North gable, late sun', 'Portrait, for the invitation.'],
    ],
  });
  await bringFiles(stage, stage.owner, id, filesOf(stage, 'library', false), 'frame');
  await letTimePass(stage.ctx.knex, id, 2 * DAY);
  await hang(stage, id, [[...stems(412, 417), ...stems(426, 430)], stems(418), stems(419, 421)]);
  const frame = await framesByName(id);
  await hideFrames(stage.owner, id, [frame('HL_0421').id]);
  await draftSheet(stage, id, [...stems(414), ...stems(417, 420), ...stems(423, 424), ...stems(428)], 14);
  await letTimePass(stage.ctx.knex, id, 3);
}

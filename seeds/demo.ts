import path from 'node:path';
import type { Context } from '../api/context.ts';
import { Account } from '../api/models/Account.ts';
import { bridgesOut, exchangePicked, libraryPreparing, skylineDelivered } from './demo/acts.ts';
import { bringAssistant, openStudio } from './demo/accounts.ts';
import { addFirm, begin } from './demo/commission.ts';
import { drawPassword } from './demo/passwords.ts';
import { architects, council, harbourTrust, homes, studio, visit } from './demo/people.ts';
import type { Stage } from './demo/stage.ts';
import { drawDemoFrames } from './scenes/draw.ts';

/** What a person needs to look around in the demo. */
export interface Demo {
  signIns: { who: string; email: string; password: string }[];
  /** Path of the lead's link to an open proof sheet: "/open/…". */
  proofingLink: string;
}

export interface DemoTools {
  /** Where the drawn pictures are kept: drawn once, used by every later demo. */
  dir: string;
  /** One line of progress for a person. */
  say?: (line: string) => void;
  /** Runs waiting jobs, where no worker is running. */
  runJobs?: () => Promise<void>;
  /** Pixels along the longer side of a frame; full size where it is missing. */
  longSide?: number;
}

/**
 * Seeds an empty installation with a studio in the invented harbour city of Vessmouth, through the same actions that its
 * pages use. A worker must be running, or `tools.runJobs` be given. Killed in the middle it leaves half a demo: the next start
 * empties the database and the store and begins again, with the pictures that are drawn already.
 *
 * @throws Error where the demo's owner is there already
 */
export async function seedDemo(ctx: Context, tools: DemoTools): Promise<Demo> {
  const say = tools.say ?? (() => undefined);
  if (await Account.query().findOne({ email: studio.owner.email })) {
    throw new Error('There is a demo, or half of one, in this database already. Empty the database and the store first.');
  }
  const frames = await drawDemoFrames({ dir: path.resolve(tools.dir), longSide: tools.longSide, onProgress: tellTenths(say) });
  const passwords = { owner: drawPassword(), assistant: drawPassword() };
  const owner = await openStudio(ctx, passwords.owner);
  const assistant = await bringAssistant(ctx, owner, passwords.assistant);
  const stage: Stage = { ctx, owner, assistant, frames, runJobs: tools.runJobs };
  const proofingLink = await play(stage, say);
  return {
    signIns: [
      { who: 'owner', email: owner.email, password: passwords.owner },
      { who: 'assistant', email: assistant.email, password: passwords.assistant },
    ],
    proofingLink,
  };
}

async function play(stage: Stage, say: (line: string) => void): Promise<string> {
  const [tarn, trust, city, tourists, builders] = [
    await addFirm(stage, architects),
    await addFirm(stage, harbourTrust),
    await addFirm(stage, council),
    await addFirm(stage, visit),
    await addFirm(stage, homes),
  ];
  say('Skyline for the annual report: proofed, finished and delivered');
  await skylineDelivered(stage, city);
  say('Corn Exchange relighting: picks sent');
  await exchangePicked(stage, tourists);
  say('Basin bridges: with the client');
  const proofingLink = await bridgesOut(stage, trust);
  say('Ropewalk Library: being prepared');
  await libraryPreparing(stage, tarn);
  await begin(stage, {
    clientId: builders,
    title: 'Sailmakers Row, phase 2',
    brief: 'Fourteen houses on the old sail lofts. To be photographed when the scaffolding is down.',
    allowance: 8,
    extraPrice: 7500,
    shotDaysAgo: null,
    dueInDays: 40,
    views: [
      ['The row from the slip', 'Afternoon.'],
      ['Courtyard with the old crane', ''],
    ],
  });
  return proofingLink;
}

/** Tells of the drawing a dozen times, not with each of its frames. */
function tellTenths(say: (line: string) => void): (drawn: number, total: number) => void {
  let told = -1;
  return (drawn, total) => {
    const tenth = Math.floor((drawn / total) * 10);
    if (tenth === told) return;
    told = tenth;
    say(`${drawn} of ${total} pictures drawn`);
  };
}

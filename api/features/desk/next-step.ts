import type { DeskAction, DeskWhen, Whose } from '../../contract/desk.ts';
import type { DeskFacts } from './desk-facts.ts';

/** The next step of a commission: whose it is, in a sentence, since or until when, and the button that does it. */
export interface NextStep {
  whose: Whose;
  says: string;
  when: DeskWhen | null;
  action: DeskAction;
}

/** The moment the desk is looked at, and the day it is in the studio's time zone ("2026-12-01"). */
export interface DeskMoment {
  now: Date;
  today: string;
}

const DAY = 24 * 60 * 60 * 1000;
/** A link that nobody opened for so long deserves attention. */
const UNOPENED_DAYS = 4;

/** Decides the next step from the facts alone. What needs the studio comes before what the client may still do. */
export function nextStep(facts: DeskFacts, moment: DeskMoment): NextStep {
  if (facts.openSheets > 0) return withClient(facts, moment);
  switch (facts.state) {
    case 'Picks in':
      return picksIn(facts, moment);
    case 'Finishing':
      return finishing(facts, moment);
    case 'Ready':
      return ready(facts, moment);
    case 'Delivered':
      return delivered(facts, moment);
    case 'With client':
      return ended(facts, moment);
    default:
      return preparing(facts, moment);
  }
}

function preparing(facts: DeskFacts, moment: DeskMoment): NextStep {
  const { frames, framesReading, framesFailed, draftNumber, draftProofs } = facts;
  if (draftNumber !== null) {
    const says = `Proof sheet ${draftNumber} with ${counted(draftProofs ?? 0, 'proof')}, not sent yet`;
    return yours(says, dueOrSince(facts, facts.draftAt, moment), go('Send proof sheet', 'proofs'));
  }
  if (frames > 0) {
    const trouble = framesFailed > 0 ? `${framesFailed} could not be read` : framesReading > 0 ? `${framesReading} being read` : '';
    const says = [`${counted(frames, 'frame')} in`, trouble, 'no proof sheet yet'].filter(Boolean).join(', ');
    const action = framesFailed > 0 ? go('Open frames', 'frames') : go('Make proof sheet', 'frames');
    return yours(says, dueOrSince(facts, facts.lastFrameAt, moment), action);
  }
  if (!facts.hasBrief && facts.views === 0) {
    return yours('No brief and no views yet', dueOrSince(facts, facts.createdAt, moment), go('Write brief', 'brief'));
  }
  const says = facts.views > 0 ? `${counted(facts.views, 'view')} asked for, no frames yet` : 'Brief written, no frames yet';
  const ahead = facts.shotOn !== null && facts.shotOn >= moment.today;
  const when: DeskWhen | null = ahead
    ? { kind: 'shot', at: facts.shotOn ?? '', urgent: facts.shotOn === moment.today }
    : dueOrSince(facts, facts.createdAt, moment);
  return yours(says, when, go('Upload frames', 'frames'));
}

function withClient(facts: DeskFacts, { now }: DeskMoment): NextStep {
  const { openNumber, openAllowance, openSince, openEndsAt, guests, guestsOpened, marked, markers, mailsFailed } = facts;
  const since = openSince ?? facts.createdAt;
  if (mailsFailed > 0) {
    const says = `${counted(mailsFailed, 'mail')} with the link to proof sheet ${openNumber} did not arrive`;
    return yours(says, { kind: 'since', at: since.toISOString(), urgent: true }, go('Open proofs', 'proofs'));
  }
  if (!guests) return yours(`Nobody is invited to proof sheet ${openNumber}`, sinceOf(since), go('Invite', 'proofs'));
  const remind: DeskAction = { words: 'Remind', step: 'proofs', does: 'remind', sheetId: facts.openSheetId };
  if (!guestsOpened) {
    const urgent = now.getTime() - since.getTime() >= UNOPENED_DAYS * DAY;
    const says = guests === 1 ? 'Link not opened yet' : `None of ${guests} links opened yet`;
    return theirs(says, { kind: 'since', at: since.toISOString(), urgent }, { ...remind, words: 'Send again' });
  }
  const picked = marked === 0 && !markers ? 'nothing picked yet' : `${marked} of ${openAllowance} picked by ${people(markers ?? 0)}`;
  return theirs(`Proof sheet ${openNumber} open: ${picked}`, leftOf(openEndsAt, since, now), remind);
}

function ended(facts: DeskFacts, moment: DeskMoment): NextStep {
  const says = `Proof sheet ${facts.endedNumber ?? ''} ended without a pick list`.replace('  ', ' ');
  return yours(says, dueOrSince(facts, facts.endedAt, moment), go('Open proofs', 'proofs'));
}

function picksIn(facts: DeskFacts, moment: DeskMoment): NextStep {
  const { listNumber, listPicks, listExtras } = facts;
  const extras = listExtras ? `, ${listExtras} extra` : '';
  const says = `Pick list ${listNumber} sent: ${counted(listPicks ?? 0, 'pick')}${extras}`;
  return yours(says, dueOrSince(facts, facts.listAt, moment), go('Open picks', 'picks'));
}

function finishing(facts: DeskFacts, moment: DeskMoment): NextStep {
  const { picks, picksWithFinal, finalsToMatch } = facts;
  const says = `${picksWithFinal} of ${picks} finals uploaded${finalsToMatch > 0 ? `, ${finalsToMatch} to match` : ''}`;
  const action = go(finalsToMatch > 0 ? 'Match finals' : 'Upload finals', 'finals');
  return yours(says, dueOrSince(facts, facts.lastFinalAt, moment), action);
}

function ready(facts: DeskFacts, moment: DeskMoment): NextStep {
  const { deliveryNumber, deliverySentAt, deliveryMadeAt, archivesFailed, finals, finalsDelivered, finalsToMatch } = facts;
  if (deliveryNumber !== null && deliverySentAt === null) {
    const failed = (archivesFailed ?? 0) > 0;
    const says = failed ? `Delivery ${deliveryNumber} could not be prepared` : `Delivery ${deliveryNumber} is being prepared`;
    return yours(
      says,
      { kind: 'since', at: (deliveryMadeAt ?? facts.createdAt).toISOString(), urgent: failed },
      go('Open delivery', 'delivery'),
    );
  }
  if (finalsToMatch > 0) {
    const says = `${counted(finals, 'final')} in, ${finalsToMatch} to match`;
    return yours(says, dueOrSince(facts, facts.lastFinalAt, moment), go('Match finals', 'finals'));
  }
  const says =
    finalsDelivered > 0 ? `${finalsDelivered} of ${finals} finals delivered` : `${counted(finals, 'final')} in, nothing delivered yet`;
  return yours(says, dueOrSince(facts, facts.lastFinalAt, moment), go('Make delivery', 'delivery'));
}

function delivered(facts: DeskFacts, { now }: DeskMoment): NextStep {
  const { deliverySentAt, deliveryEndsAt, deliveryFiles, deliveryFetched } = facts;
  const open = go('Delivery', 'delivery');
  const over = deliveryEndsAt !== null && deliveryEndsAt <= now;
  const ends: DeskWhen | null = deliveryEndsAt && {
    kind: over ? 'ended' : 'ends',
    at: deliveryEndsAt.toISOString(),
    urgent: false,
  };
  if (!deliveryFetched && !over) {
    const soon = deliveryEndsAt !== null && deliveryEndsAt.getTime() - now.getTime() < 3 * DAY;
    const when: DeskWhen = soon
      ? { kind: 'left', at: deliveryEndsAt.toISOString(), urgent: true }
      : sinceOf(deliverySentAt ?? facts.createdAt);
    return theirs(`Delivered, none of ${counted(deliveryFiles ?? 0, 'file')} fetched yet`, when, open);
  }
  const says = `Delivered · ${deliveryFetched ?? 0} of ${counted(deliveryFiles ?? 0, 'file')} fetched`;
  const close: DeskAction = { words: 'Close', step: 'delivery', does: 'close', sheetId: null };
  return { whose: 'settled', says, when: ends, action: over ? close : open };
}

function yours(says: string, when: DeskWhen | null, action: DeskAction): NextStep {
  return { whose: 'yours', says, when, action };
}

function theirs(says: string, when: DeskWhen | null, action: DeskAction): NextStep {
  return { whose: 'theirs', says, when, action };
}

function go(words: string, step: DeskAction['step']): DeskAction {
  return { words, step, does: null, sheetId: null };
}

function sinceOf(at: Date): DeskWhen {
  return { kind: 'since', at: at.toISOString(), urgent: false };
}

/** The due date once it is near, else since when it waits. */
function dueOrSince({ dueOn, createdAt }: DeskFacts, since: Date | null, { today }: DeskMoment): DeskWhen {
  const days = dueOn === null ? Infinity : (Date.parse(dueOn) - Date.parse(today)) / DAY;
  if (dueOn !== null && days <= 7) return { kind: 'due', at: dueOn, urgent: days <= 2 };
  return sinceOf(since ?? createdAt);
}

function leftOf(endsAt: Date | null, since: Date, now: Date): DeskWhen {
  if (endsAt === null) return sinceOf(since);
  return { kind: 'left', at: endsAt.toISOString(), urgent: endsAt.getTime() - now.getTime() <= 2 * DAY };
}

function counted(count: number, one: string): string {
  return `${count} ${one}${count === 1 ? '' : 's'}`;
}

function people(count: number): string {
  return ['nobody', 'one person', 'two people', 'three people'][count] ?? `${count} people`;
}

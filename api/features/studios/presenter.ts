import type { StudioSettings } from '../../contract/studios.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import type { Studio } from '../../models/Studio.ts';
import { mayChangeStudio } from './policy.ts';

export function presentStudio(studio: Studio, actor: StaffActor): StudioSettings {
  return {
    name: studio.name,
    replyTo: studio.replyTo,
    timeZone: studio.timeZone,
    currency: studio.currency,
    version: studio.version,
    can: { change: mayChangeStudio(actor) },
  };
}

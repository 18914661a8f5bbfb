import type { Context } from '../context.ts';
import type { Gates } from './actor.ts';
import type { Limits } from './limits.ts';
import type { Sessions } from './sessions.ts';

/** What a feature's router is made from: the context of its actions and the stations of its chains. */
export interface RouteContext {
  ctx: Context;
  gates: Gates;
  limits: Limits;
  sessions: Sessions;
}

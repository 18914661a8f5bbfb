import type { RequestHandler } from 'express';

/**
 * A station of a route's chain. It says nothing of params and body, so that the route's own handler keeps the types of its path.
 */
/* eslint-disable-next-line @typescript-eslint/no-explicit-any -- anything narrower would decide the types of the handler behind it */
export type Station = RequestHandler<any, any, any, any>;

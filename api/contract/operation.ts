import type { ZodType } from 'zod';

/**
 * Who may call: nobody signed in, a person of the studio, its owner, a guest, a guest of that sheet or
 * whoever looks at it by its open link, a guest of that sheet, its lead, a recipient of that delivery.
 */
export type Who = 'anyone' | 'staff' | 'owner' | 'guest' | 'looker' | 'guest-of-sheet' | 'lead' | 'recipient';

/** One thing the API can do, as the OpenAPI document describes it. */
export interface Operation {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** As in OpenAPI: `/api/sheets/{sheetId}/pick-lists`. */
  path: string;
  summary: string;
  who: Who;
  query?: ZodType;
  body?: ZodType;
  /** The answer's schema, or the media type of an answer that is no JSON. */
  answer?: ZodType | string;
  /** 200 where nothing is said. */
  status?: number;
  /** Needs `If-Match` with the row's version. */
  ifMatch?: true;
  /** The body is multipart/form-data with one file in the field of this name. */
  file?: string;
}

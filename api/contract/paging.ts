import { z } from 'zod';

/** How many rows a page of a list holds: 1 to 200, 50 where nothing is said. */
export const Limit = z.coerce.number().int().min(1).max(200).default(50);

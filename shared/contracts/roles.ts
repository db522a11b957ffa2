import { z } from 'zod';

export const roles = ['producer', 'engineer', 'assistant', 'musician', 'guest'] as const;
export const role = z.enum(roles);
/** What somebody is in one production. */
export type Role = z.infer<typeof role>;

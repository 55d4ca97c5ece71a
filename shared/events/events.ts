import * as z from 'zod';
import {endpoint} from '../endpoint';

/** `attempt:<id>`, and `attempts` for everybody's of the organisation (who may read others'). */
export const Topic = z.string().regex(/^(attempt:[0-9a-f-]{36}|attempts)$/);

/** A nudge: something of this kind changed; read it again. */
export const Nudge = z.strictObject({topic: Topic, kind: z.string(), id: z.string()});
export type Nudge = z.infer<typeof Nudge>;

export const followEvents = endpoint({
  kind: 'events',
  method: 'get',
  path: '/events',
  access: 'signed-in',
  summary: 'Nudges for the topics asked for, comma separated.',
  input: z.object({query: z.object({topics: z.string().max(2000)})}),
});

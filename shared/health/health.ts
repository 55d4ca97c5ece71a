import * as z from 'zod';
import {endpoint} from '../endpoint';

export const Health = z.strictObject({
  status: z.enum(['up', 'ready', 'not-ready']),
  build: z.string(),
});
export type Health = z.infer<typeof Health>;

export const readHealth = endpoint({
  kind: 'json',
  method: 'get',
  path: '/health',
  access: 'public',
  summary: 'Whether the process answers.',
  input: z.object({}),
  reply: Health,
});

export const readReadiness = endpoint({
  kind: 'json',
  method: 'get',
  path: '/health/ready',
  access: 'public',
  summary: 'Whether the database answers and is migrated; 503 when not.',
  input: z.object({}),
  reply: Health,
});

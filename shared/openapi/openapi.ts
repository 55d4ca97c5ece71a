import * as z from 'zod';
import {endpoint} from '../endpoint';

export const readOpenApi = endpoint({
  kind: 'json',
  method: 'get',
  path: '/openapi.json',
  access: 'signed-in',
  summary: 'This description: every call, what goes in and what comes out.',
  input: z.object({}),
  reply: z.record(z.string(), z.unknown()),
});

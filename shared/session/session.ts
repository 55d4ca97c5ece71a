import * as z from 'zod';
import {endpoint} from '../endpoint';
import {ROLES} from '../permissions';

export const PersonId = z.uuid().brand<'PersonId'>();
export type PersonId = z.infer<typeof PersonId>;

/** How one person wants to see things. */
export const Preferences = z.strictObject({
  units: z.enum(['si', 'us']),
  theme: z.enum(['system', 'light', 'dark']),
});
export type Preferences = z.infer<typeof Preferences>;

/** The person who is signed in. */
export const Me = z.strictObject({
  id: PersonId,
  name: z.string(),
  email: z.string(),
  role: z.enum(ROLES),
  organisation: z.strictObject({id: z.uuid(), name: z.string(), isDemo: z.boolean()}),
  preferences: Preferences,
});
export type Me = z.infer<typeof Me>;

/** Who is calling; `me` is null before sign-in. Sets the XSRF-TOKEN cookie. */
export const SessionState = z.strictObject({
  me: Me.nullable(),
  /** Accounts to try, where this installation is the demo. */
  demoAccounts: z.array(
    z.strictObject({
      email: z.string(),
      name: z.string(),
      role: z.enum(ROLES),
      organisation: z.string(),
      /** Known to everybody: the page may fill it in. */
      password: z.string().optional(),
    }),
  ),
});
export type SessionState = z.infer<typeof SessionState>;

export const SignInDraft = z.strictObject({
  email: z.string().trim().toLowerCase().min(3).max(254),
  password: z.string().min(1).max(200),
});
export type SignInDraft = z.infer<typeof SignInDraft>;

export const readSession = endpoint({
  kind: 'json',
  method: 'get',
  path: '/session',
  access: 'public',
  summary: 'Who is signed in.',
  input: z.object({}),
  reply: SessionState,
});

export const signIn = endpoint({
  kind: 'json',
  method: 'post',
  path: '/session',
  access: 'public',
  summary: 'Sign in with e-mail and password.',
  input: z.object({body: SignInDraft}),
  reply: SessionState,
});

export const signOut = endpoint({
  kind: 'json',
  method: 'delete',
  path: '/session',
  access: 'public',
  summary: 'Sign out; harmless when nobody is signed in.',
  input: z.object({}),
  reply: SessionState,
});

export const updatePreferences = endpoint({
  kind: 'json',
  method: 'put',
  path: '/session/preferences',
  access: 'signed-in',
  summary: 'Change units and theme.',
  input: z.object({body: Preferences}),
  reply: Me,
});

import path from 'node:path';
import * as z from 'zod';
import {nameBuild} from './build';

const isOn = z
  .enum(['0', '1'])
  .default('0')
  .transform((text) => text === '1');
const DatabaseUrl = z.url({protocol: /^postgres(ql)?$/});

const Environment = z.object({
  /** The server's own user. */
  DATABASE_URL: DatabaseUrl,
  /** The user that owns the tables and migrates. */
  DATABASE_OWNER_URL: DatabaseUrl.optional(),
  HOST: z.string().min(1).default('127.0.0.1'),
  PORT: z.coerce.number().int().min(0).max(65535).default(4000),
  /** Where people reach us; links are built from it, never from a Host header. */
  PUBLIC_URL: z.url({protocol: /^https?$/}).optional(),
  SESSION_SECRET: z.string().min(32, 'must have at least 32 characters'),
  NODE_ENV: z.enum(['production', 'development', 'test']).default('development'),
  /** Whether this installation shows the demo accounts. */
  DEMO: isOn,
  /** Folder of the built client; as seen from where we were started. */
  CLIENT_FOLDER: z.string().default('dist/client'),
  /** How many proxies stand before us; their X-Forwarded-For is believed. */
  TRUSTED_PROXIES: z.coerce.number().int().min(0).max(5).default(0),
  LOG_LEVEL: z.enum(['silent', 'error', 'warn', 'info', 'debug']).default('info'),
});

/** What the surroundings decide. */
export interface Config {
  readonly databaseUrl: string;
  readonly databaseOwnerUrl: string;
  /** Whether the server's user could change the schema. */
  readonly hasOneDatabaseUser: boolean;
  readonly host: string;
  readonly port: number;
  readonly publicUrl: string;
  /** Whether people reach us by https: cookies are then `__Host-` and Secure. */
  readonly isSecure: boolean;
  readonly sessionSecret: string;
  readonly environment: 'production' | 'development' | 'test';
  readonly isDemo: boolean;
  readonly trustedProxies: number;
  readonly logLevel: string;
  /** Folder of the built client. */
  readonly clientFolder: string;
  /** Name of the build that runs. */
  readonly build: string;
}

/** The environment does not fit; the message is one line for the person who starts us. */
export class ConfigError extends Error {}

/** Reads the environment; nothing else does. */
export function readConfig(environment: NodeJS.ProcessEnv = process.env): Config {
  // An empty variable is an unset one: `PORT= npm start`.
  const set = Object.entries(environment).filter(([, value]) => value !== '');
  const parsed = Environment.safeParse(Object.fromEntries(set));
  if (!parsed.success) {
    const faults = parsed.error.issues.map(({path, message}) => `${path.join('.')}: ${message}`);
    throw new ConfigError(`The settings of the server do not fit. ${faults.join('; ')}`);
  }
  const given = parsed.data;
  const publicUrl = given.PUBLIC_URL ?? `http://127.0.0.1:${given.PORT}`;
  const clientFolder = path.resolve(given.CLIENT_FOLDER);
  return {
    databaseUrl: given.DATABASE_URL,
    databaseOwnerUrl: given.DATABASE_OWNER_URL ?? given.DATABASE_URL,
    hasOneDatabaseUser:
      given.DATABASE_OWNER_URL === undefined || given.DATABASE_OWNER_URL === given.DATABASE_URL,
    host: given.HOST,
    port: given.PORT,
    publicUrl: publicUrl.replace(/\/+$/, ''),
    isSecure: publicUrl.startsWith('https:'),
    sessionSecret: given.SESSION_SECRET,
    environment: given.NODE_ENV,
    isDemo: given.DEMO,
    trustedProxies: given.TRUSTED_PROXIES,
    logLevel: given.LOG_LEVEL,
    clientFolder,
    build: nameBuild(clientFolder),
  };
}

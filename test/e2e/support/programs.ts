import {type ChildProcess, spawn} from 'node:child_process';
import {createServer} from 'node:net';
import path from 'node:path';

const ROOT = path.resolve(import.meta.dirname, '../../..');

/** A started program of the product: server or worker. */
export interface Program {
  readonly child: ChildProcess;
  /** What it printed so far, for the message of a failed start. */
  readonly printed: () => string;
}

/** A loopback port nobody listens on. */
export function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => {
        if (address === null || typeof address === 'string') reject(new Error('no port'));
        else resolve(address.port);
      });
    });
  });
}

/** What a program is told: the same secret for all, so that a session outlives the server that began it. */
export function programEnvironment(databaseUrl: string, port: number): Record<string, string> {
  return {
    DATABASE_URL: databaseUrl,
    SESSION_SECRET: 'only for end-to-end tests, nothing else here',
    NODE_ENV: 'production',
    PORT: String(port),
    LOG_LEVEL: 'warn',
  };
}

/** Starts a built program (`main` or `worker`) with these variables on top of the bare ones. */
export function startProgram(
  name: 'main' | 'worker',
  environment: Record<string, string>,
): Program {
  const child = spawn(process.execPath, ['--enable-source-maps', `dist/server/${name}.js`], {
    cwd: ROOT,
    env: {PATH: process.env['PATH'] ?? '', ...environment},
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let printed = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.on('data', (chunk: Buffer) => (printed = (printed + chunk.toString()).slice(-8000)));
  }
  return {child, printed: () => printed};
}

/** Waits until the server at `url` says that it is ready. */
export async function waitUntilReady(url: string, program: Program): Promise<void> {
  const end = Date.now() + 30_000;
  while (Date.now() < end) {
    if (program.child.exitCode !== null) break;
    try {
      const reply = await fetch(`${url}/api/health/ready`);
      if (reply.ok) return;
    } catch {
      // connection refused while it starts
    }
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error(`the server at ${url} did not become ready:\n${program.printed()}`);
}

/** Ends a program and waits until it is gone; SIGKILL gives it no chance to tidy up. */
export async function endProgram(program: Program, signal: 'SIGTERM' | 'SIGKILL'): Promise<void> {
  if (program.child.exitCode !== null || program.child.signalCode !== null) return;
  const gone = new Promise<void>((resolve) => program.child.once('exit', () => resolve()));
  program.child.kill(signal);
  await gone;
}

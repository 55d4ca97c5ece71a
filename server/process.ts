import {ConfigError} from './config';
import {AppError} from './errors';

/** Runs a program until it is asked to stop. Start-up errors are one line; a second signal does not wait. */
export async function runProgram(start: () => Promise<{stop: () => Promise<void>}>): Promise<void> {
  const asked = new Promise<void>((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => resolve());
  });
  try {
    const program = await start();
    await asked;
    await program.stop();
  } catch (error) {
    process.stderr.write(`${sayWhy(error)}\n`);
    process.exitCode = 1;
    process.exit();
  }
}

/** One line for what the person who starts us can mend; the whole of anything else. */
export function sayWhy(error: unknown): string {
  if (error instanceof ConfigError || error instanceof AppError) return error.message;
  const {code, port} = Object(error) as {code?: unknown; port?: unknown};
  if (code === 'EADDRINUSE') return `Port ${String(port)} is taken.`;
  if (code === 'ECONNREFUSED' || code === '57P03') return 'The database does not answer.';
  if (code === '28P01') return 'The database refuses the user or the password of DATABASE_URL.';
  if (code === '3D000') return 'The database that DATABASE_URL names does not exist.';
  return error instanceof Error ? (error.stack ?? error.message) : String(error);
}

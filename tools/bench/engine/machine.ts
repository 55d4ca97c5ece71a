import {execFileSync} from 'node:child_process';
import os from 'node:os';

/** Where the figures were measured. */
export interface Machine {
  readonly cores: number;
  readonly cpu: string;
  readonly memoryGiB: number;
  readonly node: string;
  readonly gcc: string;
  /** Mean number of waiting programs over a minute when the measurement began: near 0 when alone. */
  readonly load: number;
}

export function machine(): Machine {
  const cpus = os.cpus();
  return {
    cores: cpus.length,
    cpu: cpus[0]?.model.trim() ?? 'unknown',
    memoryGiB: Math.round(os.totalmem() / 2 ** 30),
    node: process.version,
    gcc: execFileSync('gcc', ['-dumpfullversion'], {encoding: 'utf8'}).trim(),
    load: Math.round(os.loadavg()[0]! * 10) / 10,
  };
}

import {availableParallelism} from 'node:os';
import {MessageChannel} from 'node:worker_threads';
import {Piscina} from 'piscina';
import {type ReplayAnswer, ReplayLimitError, type ReplayWork} from './replay';

/** One replay may take this long [ms]. */
const LIMIT_MS = 5_000;
/** Memory of one thread [MB]; rows of a trace lie beside it and are bounded by the exercise's length. */
const MEMORY_MB = 256;
const IDLE_MS = 60_000;

// The sources run under tsx; in the bundle the thread is an entry of its own, beside the worker.
const isSource = import.meta.url.endsWith('.ts');
const THREAD = new URL(`./replay-thread.${isSource ? 'ts' : 'js'}`, import.meta.url);
const LOADER = new URL('./source-threads.mjs', import.meta.url);

/** Threads that run logs again, so that the worker process itself stays free. */
export class ReplayPool {
  private threads: Piscina | undefined;

  constructor(
    private readonly limitMs = LIMIT_MS,
    private readonly memoryMb = MEMORY_MB,
  ) {}

  /** The time counts from when a thread begins, not while it waits for one. */
  async run(work: ReplayWork): Promise<ReplayAnswer> {
    this.threads ??= this.makeThreads();
    const {port1: heard, port2: began} = new MessageChannel();
    const limit = new AbortController();
    let timer: NodeJS.Timeout | undefined;
    heard.once('message', () => {
      timer = setTimeout(() => limit.abort(), this.limitMs);
    });
    try {
      return (await this.threads.run(
        {work, began},
        {name: 'replayAndScore', signal: limit.signal, transferList: [began]},
      )) as ReplayAnswer;
    } catch (error) {
      // An abort ends the thread; a thread out of memory ends by itself.
      if (limit.signal.aborted) throw new ReplayLimitError(`it took more than ${this.limitMs} ms`);
      if (codeOf(error) === 'ERR_WORKER_OUT_OF_MEMORY')
        throw new ReplayLimitError(`it took more than ${this.memoryMb} MB`);
      throw error;
    } finally {
      clearTimeout(timer);
      heard.close();
    }
  }

  async close(): Promise<void> {
    const {threads} = this;
    this.threads = undefined;
    await threads?.destroy();
  }

  private makeThreads(): Piscina {
    return new Piscina({
      filename: THREAD.href,
      ...(isSource && {execArgv: ['--import', LOADER.href]}),
      minThreads: 1,
      maxThreads: Math.max(1, availableParallelism() - 1),
      idleTimeout: IDLE_MS,
      resourceLimits: {maxOldGenerationSizeMb: this.memoryMb},
    });
  }
}

function codeOf(error: unknown): unknown {
  return (Object(error) as {code?: unknown}).code;
}

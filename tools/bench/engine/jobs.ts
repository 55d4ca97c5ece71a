/** What the measured engine program is asked for, as JSON in its first word. `file` holds a document. */
export type Job =
  /** Tension each `everyTicks` ticks, the end included. */
  | {readonly kind: 'rows'; readonly file: string; readonly everyTicks: number}
  /** Time of each of `runs` runs; `keep`: with a row in each tick; `before`: documents run first, untimed. */
  | {
      readonly kind: 'time';
      readonly file: string;
      readonly runs: number;
      readonly keep: boolean;
      readonly before: readonly string[];
    }
  | {readonly kind: 'map'; readonly file: string; readonly workers: number}
  | {readonly kind: 'memory'; readonly file: string};

/** One timed run; `sum` is made from the state at its end. */
export interface TimedRun {
  /** By the clock. */
  readonly ns: number;
  /** Of the processor, all threads of the process together. */
  readonly cpuNs: number;
  readonly ticks: number;
  readonly sum: number;
}

export interface MapResult {
  /** From starting the workers to the last result [s]. */
  readonly totalS: number;
  /** Of the processor, all threads together [s]. */
  readonly cpuS: number;
  /** Time simulated by all runs together [s]; a web that breaks ends its run early. */
  readonly simulatedS: number;
  readonly points: number;
  readonly broken: number;
  /** Least and greatest integral of the absolute error of the runs that did not break [N·s]. */
  readonly leastNs: number;
  readonly greatestNs: number;
}

/** Memory of a process [bytes]. */
export interface Memory {
  readonly rss: number;
  readonly heapUsed: number;
  readonly arrayBuffers: number;
}

export interface MemoryResult {
  readonly before: Memory;
  readonly after: Memory;
  readonly rows: number;
  /** All typed arrays of the block of rows [bytes]. */
  readonly rowBytes: number;
}

/** One point of the map: kp and tiS. */
export type MapPoint = readonly [number, number];

/** What a map's thread is given and gives back. */
export interface MapShare {
  readonly file: string;
  readonly points: readonly MapPoint[];
}
export interface MapPointResult {
  readonly errorNs: number;
  readonly ticks: number;
  readonly isBroken: boolean;
}

/** A private cluster that runs; see pg.mjs. */
export interface Postgres {
  /** As the owner, who is superuser of this cluster. */
  readonly url: string;
  /** As the server's own user, who owns nothing. */
  readonly serverUrl: string;
  readonly port: number;
  readonly pid: number;
  readonly dir: string;
  /** Whether this call started the server; false when it joined one. */
  readonly started: boolean;
  /** Leaves the cluster; the last one to leave stops the server. */
  readonly stop: () => Promise<void>;
}

export declare function startPostgres(options?: {
  readonly sub?: string;
  readonly ephemeral?: boolean;
  readonly keep?: boolean;
  readonly say?: (line: string) => void;
}): Promise<Postgres>;

export declare function stopPostgres(sub?: string): Promise<void>;

/** Types of postgres.mjs for tests, which are TypeScript; set-up scripts are plain so that they run before any package is there. */
export declare function freePort(): Promise<number>;

export declare class PrivateCluster {
  constructor(home: string, options?: { throwAway?: boolean });
  readonly data: string;
  readonly port: number;
  readonly ownerUrl: string;
  readonly applicationUrl: string;
  start(port?: number): Promise<void>;
  stop(): Promise<void>;
  remove(): Promise<void>;
  /** Runs one of PostgreSQL’s programs as the server’s account. */
  program(name: string, args: string[]): Promise<{ code: number; output: string }>;
  sql(statement: string, database?: string): Promise<string>;
}

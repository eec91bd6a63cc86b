/**
 * What a file bench/<name>.bench.ts exports: `needs`, what is to run while it measures, and `run`.
 * "services": PostgreSQL, Redis, object storage and mail, and a migrated database; "programs": these, and worker and api.
 */
export interface Bench {
  needs?: ('services' | 'programs')[];
  run(context: BenchContext): Promise<void>;
}

export interface BenchContext {
  /** The environment of programs and of clients of the services, as in the integration tests. Empty where nothing was asked for. */
  env: Record<string, string>;
  /** Where the api answers; only with "programs". */
  apiUrl: string | undefined;
  /** One line of the result. */
  print: (line: string) => void;
}

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
  /** The worker that runs from the beginning; only with "programs". */
  worker: BenchWorker | undefined;
  /** Starts another worker beside it, for a bench that compares; only with "programs". What is still running at the end is stopped. */
  startWorker: ((env?: Record<string, string>) => Promise<BenchWorker>) | undefined;
  /** One line of the result. */
  print: (line: string) => void;
}

export interface BenchWorker {
  pid: number | undefined;
  stop: () => Promise<void>;
}

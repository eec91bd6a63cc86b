import pino, { type DestinationStream, type Logger } from 'pino';

export type { Logger } from 'pino';

/**
 * JSON lines on standard output. Neither tokens nor file names may appear in them: lines name routes and ids, and errors are cut to what they are,
 * not what they carry.
 */
export function createLogger(name: string, level: string, destination?: DestinationStream): Logger {
  return pino({ name, level, timestamp: pino.stdTimeFunctions.isoTime, serializers: { err: describeError } }, destination);
}

export interface DescribedError {
  type: string;
  message: string;
  code?: string;
  stack?: string;
  cause?: DescribedError;
}

/** An error for the log: a query's parameters and PostgreSQL's `detail` stay out, for they hold rows. */
export function describeError(error: unknown): DescribedError {
  if (!(error instanceof Error)) return { type: typeof error, message: 'something other than an error was thrown' };
  // drizzle's message repeats the query with its parameters; its cause has PostgreSQL's own.
  const message = error.message.startsWith('Failed query') ? 'Failed query' : error.message;
  const stack = error.stack?.split('\n').filter((line) => /^\s+at /.test(line)).join('\n');
  return {
    type: error.name,
    message,
    ...('code' in error && typeof error.code === 'string' ? { code: error.code } : {}),
    ...(stack === undefined ? {} : { stack }),
    ...(error.cause === undefined ? {} : { cause: describeError(error.cause) }),
  };
}

/** The framework's own lines through the same logger, in the shape that Nest takes. */
export class FrameworkLogger {
  constructor(private readonly logger: Logger) {}
  log(message: unknown): void {
    this.logger.debug({ framework: spell(message) });
  }
  warn(message: unknown): void {
    this.logger.warn({ framework: spell(message) });
  }
  error(message: unknown): void {
    this.logger.error({ framework: spell(message) });
  }
}

function spell(message: unknown): string | DescribedError {
  if (message instanceof Error) return describeError(message);
  return typeof message === 'string' ? message : JSON.stringify(message);
}

import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import * as schema from '../schema';

/** What every repository works on: one open transaction whose tenancy is set. */
export type Transaction = Omit<NodePgDatabase<typeof schema>, 'transaction' | '$client'>;

/** Who asks. Every field that is set opens the rows of that organisation, person, e-mail address or link, and no others. */
export interface TransactionScope {
  organisationId?: string;
  userId?: string;
  email?: string;
  /** SHA-256 of a session's or a mailed link's token. */
  tokenHash?: Buffer;
  /** The worker's relay: reads the outbox across organisations, and nothing else. */
  relay?: true;
}

/** The database can't be reached, or the connection was lost before the transaction was known to be committed. */
export class DatabaseUnavailableError extends Error {
  override readonly name = 'DatabaseUnavailableError';
}

export interface DatabaseOptions {
  url: string;
  poolSize: number;
  applicationName: string;
  /** How long to wait for a free connection. */
  connectionTimeoutMs?: number;
  onConnectionError?: (error: Error) => void;
}

const idleInTransactionMs = 5_000;
const lockWaitMs = 15_000;
const statementMs = 60_000;

/** SQLSTATE class 08 (connection), 57P (shut down, crashed, starting up), 25P03 (held too long in a transaction), 53300 (too many connections). */
function isConnectionLoss(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  const code = 'code' in error && typeof error.code === 'string' ? error.code : '';
  if (/^(08|57P0[1-3]|25P03|53300)/.test(code)) return true;
  if (/^(ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT|ENOTFOUND)$/.test(code)) return true;
  if (/connection terminated|timeout exceeded when trying to connect|not queryable|connection error|client has encountered/i.test(error.message)) return true;
  return error.cause !== undefined && isConnectionLoss(error.cause);
}

/**
 * The only way to the tables. drizzle's own transaction() leaks a client when `begin` fails, and knows nothing of organisations;
 * so the client, the transaction and the tenancy settings are owned here.
 */
export class Database {
  private readonly pool: pg.Pool;

  constructor(private readonly options: DatabaseOptions) {
    this.pool = new pg.Pool({
      connectionString: options.url,
      max: options.poolSize,
      application_name: options.applicationName,
      connectionTimeoutMillis: options.connectionTimeoutMs ?? 10_000,
      keepAlive: true,
      // A process that is held (SIGSTOP, a lost network) in the midst of a transaction must not hold its row locks against the others.
      idle_in_transaction_session_timeout: idleInTransactionMs,
      lock_timeout: lockWaitMs,
      statement_timeout: statementMs,
    });
    // Without a listener, an idle connection that PostgreSQL drops would take the process down.
    this.pool.on('error', (error) => options.onConnectionError?.(error));
  }

  /**
   * Runs `work` in one transaction with the scope's settings, commits, and gives its result; any error rolls back.
   * A connection that turns out dead before the work began is replaced once; later losses raise DatabaseUnavailableError,
   * and then the caller can't know whether the commit was reached, so writes must be safe to ask for again.
   */
  async transaction<Result>(scope: TransactionScope, work: (tx: Transaction) => Promise<Result>): Promise<Result> {
    const client = await this.begin(scope);
    let lost: Error | undefined;
    const onError = (error: Error) => {
      lost = error;
    };
    client.on('error', onError);
    try {
      const result = await work(drizzle({ client, schema }));
      const { command } = await client.query('commit');
      // PostgreSQL answers the commit of a failed transaction with a rollback, and without an error.
      if (command !== 'COMMIT') throw new Error('The transaction had failed before its commit.');
      client.off('error', onError);
      client.release();
      return result;
    } catch (error) {
      await this.abandon(client, onError, lost);
      if (lost !== undefined || isConnectionLoss(error)) {
        throw new DatabaseUnavailableError('The database connection was lost.', { cause: error });
      }
      throw error;
    }
  }

  /** Resolves when the database answers. @throws DatabaseUnavailableError */
  async ping(): Promise<void> {
    await this.transaction({}, async (tx) => {
      await tx.execute('select 1');
    });
  }

  async close(): Promise<void> {
    await this.pool.end();
  }

  private async begin(scope: TransactionScope): Promise<pg.PoolClient> {
    try {
      return await this.tryToBegin(scope);
    } catch (error) {
      if (!isConnectionLoss(error)) throw error;
    }
    // The pool may have handed out a connection that died while idle; nothing has been done on it, so one more try is safe.
    try {
      return await this.tryToBegin(scope);
    } catch (error) {
      if (!isConnectionLoss(error)) throw error;
      throw new DatabaseUnavailableError('The database cannot be reached.', { cause: error });
    }
  }

  private async tryToBegin(scope: TransactionScope): Promise<pg.PoolClient> {
    const client = await this.pool.connect();
    const ignore = () => undefined;
    client.on('error', ignore);
    try {
      await client.query('begin');
      await client.query(
        `select set_config('masswright.organisation_id', $1, true), set_config('masswright.user_id', $2, true),
                set_config('masswright.email', $3, true), set_config('masswright.token_hash', $4, true), set_config('masswright.scope', $5, true)`,
        [
          scope.organisationId ?? '',
          scope.userId ?? '',
          scope.email ?? '',
          scope.tokenHash?.toString('hex') ?? '',
          scope.relay === true ? 'relay' : '',
        ],
      );
    } catch (error) {
      client.off('error', ignore);
      client.release(error instanceof Error ? error : true);
      throw error;
    }
    client.off('error', ignore);
    return client;
  }

  private async abandon(client: pg.PoolClient, onError: (error: Error) => void, lost: Error | undefined): Promise<void> {
    try {
      if (lost !== undefined) throw lost;
      await client.query('rollback');
      client.off('error', onError);
      client.release();
    } catch (error) {
      // A client that can't even roll back is not fit for the next caller.
      client.release(error instanceof Error ? error : true);
    }
  }
}

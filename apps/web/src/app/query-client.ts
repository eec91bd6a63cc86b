import { QueryCache, QueryClient } from '@tanstack/react-query';
import { sessionKey } from '../features/session/api/session';
import { isProblem, isWorthAnotherTry } from '../lib/problem';

/** A session that ended elsewhere shows itself in any answer; the guard then leads to the sign-in page. */
export function createQueryClient(): QueryClient {
  const client: QueryClient = new QueryClient({
    queryCache: new QueryCache({
      onError: (error) => {
        if (isProblem(error, 'not-signed-in')) client.setQueryData(sessionKey, null);
      },
    }),
    defaultOptions: {
      queries: {
        // Events say what has changed; a reconnected stream has everything read again.
        staleTime: 30_000,
        retry: (failures, error) => failures < 2 && isWorthAnotherTry(error),
        retryDelay: (attempt) => 400 * 2 ** attempt,
      },
      mutations: {
        onError: (error) => {
          if (isProblem(error, 'not-signed-in') && client.getQueryData(sessionKey)) client.setQueryData(sessionKey, null);
        },
      },
    },
  });
  return client;
}

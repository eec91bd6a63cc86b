import createFetchClient, { type Client } from 'openapi-fetch';
import type { paths } from './schema.generated';

export type { components, paths } from './schema.generated';

/** The api's client, typed by the OpenAPI document; answers come as they are, refusals as problem details in `error`. */
export type ApiClient = Client<paths>;

export function createClient(options: { baseUrl?: string; fetch?: (request: Request) => Promise<Response> } = {}): ApiClient {
  return createFetchClient<paths>({ baseUrl: options.baseUrl ?? '', fetch: options.fetch });
}

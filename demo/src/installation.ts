import { createClient, type ApiClient } from '@masswright/client';

/** One person at the api, as their browser would be: it keeps the cookie and says where it comes from. */
export class DemoPerson {
  readonly api: ApiClient;
  private cookie: string | undefined;

  constructor(publicUrl: string) {
    this.api = createClient({
      baseUrl: publicUrl,
      fetch: async (request) => {
        request.headers.set('Origin', publicUrl);
        if (this.cookie !== undefined) request.headers.set('Cookie', this.cookie);
        const response = await fetch(request);
        const [line] = response.headers.getSetCookie();
        if (line !== undefined) this.cookie = line.split(';')[0];
        return response;
      },
    });
  }
}

/** Gives what an answer holds. @throws Error with the problem's sentence */
export function get<Data>(answer: { data?: Data; error?: { detail: string } | undefined; response: Response }): Data {
  if (answer.data === undefined) throw new Error(answer.error?.detail ?? `The api answered ${answer.response.status}.`);
  return answer.data;
}

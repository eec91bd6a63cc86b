import { createHash, randomUUID } from 'node:crypto';
import type { CompleteUploadRequest, IntakeSetting, Part, PartGrants, Project, Session, Upload } from '@masswright/contracts';
import { checkAgainstDocument } from './api-document';

export interface Answer<Body = unknown> {
  status: number;
  body: Body;
  headers: Headers;
}

export const password = 'a long enough password';

export const hashOf = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

/** A file's parts as its upload wants them. */
export function cutIntoParts(bytes: Uint8Array, { partCount, partSizeBytes }: Pick<Upload, 'partCount' | 'partSizeBytes'>): Uint8Array<ArrayBuffer>[] {
  return Array.from({ length: partCount }, (_, index) => new Uint8Array(bytes.slice(index * partSizeBytes, (index + 1) * partSizeBytes)));
}

/** Someone who uses the api as the web app does: with a cookie, an origin, and every answer held against the OpenAPI document. */
export class ApiUser {
  cookie: string | undefined;
  session: Session | undefined;

  constructor(
    readonly url: string,
    private readonly origin: string,
  ) {}

  async ask<Body = unknown>(method: string, path: string, body?: unknown, headers: Record<string, string> = {}): Promise<Answer<Body>> {
    const response = await fetch(`${this.url}/api/v1${path}`, {
      method,
      headers: {
        Origin: this.origin,
        ...(this.cookie === undefined ? {} : { Cookie: this.cookie }),
        ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
        ...headers,
      },
      ...(body === undefined ? {} : { body: typeof body === 'string' ? body : JSON.stringify(body) }),
    });
    for (const line of response.headers.getSetCookie()) {
      const pair = line.split(';')[0] ?? '';
      this.cookie = pair.endsWith('=') ? undefined : pair;
    }
    const text = await response.text();
    const isJson = /json/u.test(response.headers.get('content-type') ?? '');
    const parsed: unknown = text === '' ? undefined : isJson ? JSON.parse(text) : text;
    checkAgainstDocument({ method, path: `/api/v1${path.split('?')[0] ?? ''}`, status: response.status, contentType: response.headers.get('content-type'), body: parsed });
    return { status: response.status, body: parsed as Body, headers: response.headers };
  }

  /** Asks for what must succeed. */
  async get<Body>(path: string): Promise<Body> {
    return this.expect<Body>('GET', path);
  }

  async expect<Body>(method: string, path: string, body?: unknown): Promise<Body> {
    const answer = await this.ask<Body>(method, path, body);
    if (answer.status >= 400) throw new Error(`${method} ${path} → ${answer.status}: ${JSON.stringify(answer.body)}`);
    return answer.body;
  }

  async signUp(name = 'Ines Marsh', organisationName = `Organisation ${randomUUID()}`, email = `${randomUUID()}@halyard.example`): Promise<Session> {
    this.session = await this.expect<Session>('POST', '/sign-up', { name, organisationName, email, password });
    return this.session;
  }

  async signIn(email: string, given = password): Promise<Session> {
    this.session = await this.expect<Session>('POST', '/sign-in', { email, password: given });
    return this.session;
  }

  createProject(name = `Project ${randomUUID()}`): Promise<Project> {
    return this.expect<Project>('POST', '/projects', { name });
  }

  /** Sends a file's bytes to the storage in its parts, as a browser does, without completing the upload. */
  async send(projectId: string, fileName: string, bytes: Uint8Array): Promise<Upload> {
    const upload = await this.expect<Upload>('POST', `/projects/${projectId}/uploads`, { fileName, sizeBytes: bytes.length });
    const bodies = cutIntoParts(bytes, upload);
    const parts = bodies.map((body, index) => ({ partNumber: index + 1, sha256: hashOf(body) }));
    // Hashing a large file has kept this process busy: what the server closed meanwhile must be heard of before it is used again.
    if (bytes.length > 100_000_000) await new Promise((resolve) => setTimeout(resolve, 50));
    // A hundred are granted at once.
    for (let first = 0; first < parts.length; first += 100) {
      const { grants } = await this.expect<PartGrants>('POST', `/uploads/${upload.id}/part-grants`, { parts: parts.slice(first, first + 100) });
      for (const { partNumber, url, headers } of grants) {
        const sent = await fetch(url, { method: 'PUT', headers, body: bodies[partNumber - 1] ?? null });
        if (!sent.ok) throw new Error(`Part ${partNumber} was refused: ${sent.status} ${await sent.text()}`);
      }
    }
    return upload;
  }

  complete(uploadId: string, setting: IntakeSetting = { lengthUnit: 'mm', densityKgM3: 2700 }, more: Omit<CompleteUploadRequest, 'setting'> = {}): Promise<Part> {
    return this.expect<Part>('POST', `/uploads/${uploadId}/completion`, { setting, ...more });
  }

  async addMesh(projectId: string, fileName: string, bytes: Uint8Array, setting?: IntakeSetting, more?: Omit<CompleteUploadRequest, 'setting'>): Promise<Part> {
    const upload = await this.send(projectId, fileName, bytes);
    return this.complete(upload.id, setting, more);
  }

  /** Waits until a part's file is measured or refused. */
  async waitForRun(partId: string, timeoutMs = 20_000): Promise<Part> {
    const end = Date.now() + timeoutMs;
    for (;;) {
      const part = await this.get<Part>(`/parts/${partId}`);
      if (part.revision.run.state === 'done' || part.revision.run.state === 'failed') return part;
      if (Date.now() > end) throw new Error(`The run is still ${part.revision.run.state} (${part.revision.run.stage}) after ${timeoutMs} ms.`);
      await new Promise((resolve) => setTimeout(resolve, 30));
    }
  }
}

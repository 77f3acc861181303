/** Somebody signed in at a running server, over plain HTTP: for tests that need state fast, or other than a browser would make it. */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { API_PREFIX, CSRF_HEADER } from '@/shared/contracts/common';
import { recordingSchema, type Recording } from '@/shared/contracts/recordings';
import { pause } from '@/scripts/lib/shell';
import type { LogFiles } from './log-files';

const DECODE_LIMIT_MS = 120_000;

export const FIRST_ADMIN = { name: 'Ona Veld', email: 'ona@kelmar.test', password: 'harbour at first light' };

export class Person {
  private constructor(
    private readonly server: string,
    readonly cookie: string,
  ) {}

  /** On an empty installation: the first admin, with a workspace. */
  static async firstAdmin(server: string): Promise<Person> {
    const answer = await post(server, '/installation/first-admin', {
      ...FIRST_ADMIN,
      workspaceName: 'Kelmar survey',
    });
    if (!answer.ok) throw new Error(`The first admin was answered ${answer.status}: ${await answer.text()}`);
    return new Person(server, cookieOf(answer));
  }

  static async signIn(server: string, email: string, password: string): Promise<Person> {
    const answer = await post(server, '/sessions', { email, password });
    if (!answer.ok)
      throw new Error(`Sign-in of ${email} was answered ${answer.status}: ${await answer.text()}`);
    return new Person(server, cookieOf(answer));
  }

  /** The raw answer, whatever its status. */
  request(method: string, route: string, body?: unknown): Promise<Response> {
    const isForm = body instanceof FormData;
    return fetch(`${this.server}${API_PREFIX}${route}`, {
      method,
      headers: {
        Cookie: this.cookie,
        [CSRF_HEADER]: '1',
        ...(body === undefined || isForm ? {} : { 'Content-Type': 'application/json' }),
      },
      body: body === undefined ? undefined : isForm ? body : JSON.stringify(body),
    });
  }

  /** The JSON of an answer that must be a success. */
  async json(method: string, route: string, body?: unknown): Promise<unknown> {
    const answer = await this.request(method, route, body);
    if (!answer.ok)
      throw new Error(`${method} ${route} was answered ${answer.status}: ${await answer.text()}`);
    return answer.json();
  }

  /** The first page of a list. */
  async list<T>(route: string): Promise<T[]> {
    return ((await this.json('GET', route)) as { items: T[] }).items;
  }

  /** Uploads paired logs and waits until they are decoded. */
  async upload(name: string, files: LogFiles): Promise<Recording> {
    const form = new FormData();
    form.set('meta', JSON.stringify({ name }));
    for (const role of ['imu', 'gnss'] as const) {
      form.set(role, new Blob([readFileSync(files[role])]), path.basename(files[role]));
    }
    const { id } = recordingSchema.parse(await this.json('POST', '/recordings', form));
    return this.decoded(id);
  }

  async decoded(recordingId: string): Promise<Recording> {
    const deadline = Date.now() + DECODE_LIMIT_MS;
    for (;;) {
      const recording = recordingSchema.parse(await this.json('GET', `/recordings/${recordingId}`));
      if (recording.status === 'ready') return recording;
      if (!['uploaded', 'decoding'].includes(recording.status) || Date.now() > deadline) {
        throw new Error(`The recording is ${recording.status}: ${JSON.stringify(recording)}`);
      }
      await pause(100);
    }
  }
}

const post = (server: string, route: string, body: unknown) =>
  fetch(`${server}${API_PREFIX}${route}`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', [CSRF_HEADER]: '1' },
    body: JSON.stringify(body),
  });

const cookieOf = (answer: Response) =>
  answer.headers
    .getSetCookie()
    .map((cookie) => cookie.split(';')[0])
    .join('; ');

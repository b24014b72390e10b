import type { Server } from 'node:http';
import { expect } from 'vitest';
import request, { type Response } from 'supertest';
import { problemSchema } from '../../../shared/schemas/problem.js';
import { allRoutes } from '../../../server/routes/all.js';

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

function routeOf(method: string, path: string) {
  const wanted = path.replace(/\?.*/, '').replace(/^\/api\/v1/, '');
  const fits = allRoutes.filter(
    (route) => route.method === method && new RegExp(`^${route.path.replace(/:\w+/g, '[^/]+')}$`).test(wanted),
  );
  return fits.find((route) => route.path === wanted) ?? fits[0];
}

/** Every answer keeps to the contract: its schema, or problem details. */
function checkAnswer(method: string, path: string, response: Response): void {
  const what = `${method} ${path} answered ${String(response.status)}`;
  if (response.status >= 400) {
    expect(response.type, what).toBe('application/problem+json');
    const problem = problemSchema.safeParse(response.body);
    expect(problem.error?.issues, what).toBeUndefined();
    expect(problem.data?.status, what).toBe(response.status);
    return;
  }
  const route = routeOf(method, path);
  if (!route) return;
  expect(response.status, what).toBe(route.answers.status);
  if (!route.answers.schema) return;
  expect(route.answers.schema.safeParse(response.body).error?.issues, what).toBeUndefined();
}

/** One browser or script with its own cookies; each answer is held to the contract. */
export class Person {
  readonly cookies = new Map<string, string>();

  constructor(private readonly server: Server) {}

  async send(method: Method, path: string, body?: unknown, headers: Record<string, string> = {}): Promise<Response> {
    let call = request(this.server)[method](path).set(headers);
    if (this.cookies.size > 0) call = call.set('Cookie', [...this.cookies].map(([k, v]) => `${k}=${v}`).join('; '));
    const response = body === undefined ? await call : await call.send(body as object);
    this.keepCookies(response);
    if (path.startsWith('/api/v1')) checkAnswer(method, path, response);
    return response;
  }

  get = (path: string) => this.send('get', path);
  post = (path: string, body: unknown = {}) => this.send('post', path, body);
  put = (path: string, body: unknown = {}) => this.send('put', path, body);
  delete = (path: string) => this.send('delete', path);

  /** Another tab or a thief: the same cookies as now. */
  copy(): Person {
    const other = new Person(this.server);
    for (const [name, value] of this.cookies) other.cookies.set(name, value);
    return other;
  }

  private keepCookies(response: Response): void {
    const lines = (response.headers['set-cookie'] as unknown as string[] | undefined) ?? [];
    for (const line of lines) {
      const [pair, ...attributes] = line.split(/;\s*/);
      const [name, value] = (pair ?? '').split('=');
      if (!name) continue;
      const gone = value === '' || attributes.some((a) => /^Expires=Thu, 01 Jan 1970/.test(a) || a === 'Max-Age=0');
      if (gone) this.cookies.delete(name);
      else this.cookies.set(name, value ?? '');
    }
  }
}

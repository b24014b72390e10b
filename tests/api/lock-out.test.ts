import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { mostFailures } from '../../server/services/lockOut.js';
import { demoPassword, TestServer } from './support/server.js';

let server: TestServer;
beforeEach(async () => {
  server = await TestServer.start();
});
afterEach(() => server.stop());

const email = 'viewer@brackenmoor.example';
const guess = (address = email, password = 'wrong guess') =>
  server.nobody().post('/api/v1/session', { email: address, password });

async function failOften(times: number, address = email): Promise<number[]> {
  const statuses: number[] = [];
  for (let i = 0; i < times; i++) statuses.push((await guess(address)).status);
  return statuses;
}

describe('guessing at an account', () => {
  it('locks it, says for how long, and lets the owner in afterwards', async () => {
    expect(await failOften(mostFailures)).toEqual([...Array<number>(mostFailures - 1).fill(401), 429]);
    const right = await guess(email, demoPassword);
    expect(right.status).toBe(429);
    expect(Number(right.headers['retry-after'])).toBeGreaterThan(14 * 60);
    expect((right.body as { detail: string }).detail).toMatch(/try again in 15 min/);
    server.passes(15 * 60_000 + 1000);
    expect((await guess(email, demoPassword)).status).toBe(200);
  });

  it('locks an address that nobody has in the same way', async () => {
    const unknown = await failOften(mostFailures, 'nobody@brackenmoor.example');
    expect(unknown).toEqual([...Array<number>(mostFailures - 1).fill(401), 429]);
  });

  it('leaves other people alone', async () => {
    await failOften(mostFailures);
    expect((await guess('designer@brackenmoor.example', demoPassword)).status).toBe(200);
  });

  it('is not made faster by sending all guesses at once, and the right one behind them', async () => {
    const { workers } = server.context;
    const check = workers.checkPassword.bind(workers);
    let waiting = 0;
    const allWait = new Promise<void>((resolve) => {
      vi.spyOn(workers, 'checkPassword').mockImplementation((password, hash) => {
        if (++waiting === 20) resolve();
        return check(password, hash);
      });
    });
    const wrong = Array.from({ length: 20 }, () => guess());
    await allWait;
    const right = await guess(email, demoPassword);
    const statuses = (await Promise.all(wrong)).map(({ status }) => status);
    expect(right.status).toBe(429);
    expect(statuses.filter((status) => status === 401).length).toBeLessThan(mostFailures);
    expect(new Set(statuses)).toEqual(new Set([401, 429]));
  });

  it('forgets failures once the owner signs in', async () => {
    await failOften(mostFailures - 1);
    expect((await guess(email, demoPassword)).status).toBe(200);
    expect(await failOften(mostFailures - 1)).not.toContain(429);
  });

  it('counts wrong present passwords of a session that was left open, too', async () => {
    const thief = await server.signIn(email);
    const statuses: number[] = [];
    for (let i = 0; i <= mostFailures; i++) {
      const body = { currentPassword: 'wrong guess', newPassword: 'a longer wick burns on' };
      statuses.push((await thief.put('/api/v1/account/password', body)).status);
    }
    expect(statuses.slice(0, mostFailures - 1)).toEqual(Array(mostFailures - 1).fill(422));
    expect(statuses.slice(mostFailures - 1)).toEqual([429, 429]);
  });
});

describe('guessing from one address at many accounts', () => {
  it('is stopped after sixty failures, with Retry-After', async () => {
    let last = await guess('a0@brackenmoor.example');
    for (let i = 1; i < 60; i++) last = await guess(`a${String(i)}@brackenmoor.example`);
    expect(last.status).toBe(401);
    const stopped = await guess('a60@brackenmoor.example');
    expect(stopped.status).toBe(429);
    expect(Number(stopped.headers['retry-after'])).toBeGreaterThan(0);
  });

  it('does not count people who sign in', async () => {
    for (let i = 0; i < 70; i++) expect((await guess(email, demoPassword)).status).toBe(200);
  });
});

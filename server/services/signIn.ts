import { createHash, randomUUID } from 'node:crypto';
import type { AppContext } from '../context.js';
import { Session, User } from '../database/entities/people.js';
import { DomainError } from '../errors.js';
import { newRefreshToken, type IssuedSession } from './sessions.js';

/** Wrong passwords that lock an address, the time over which they count, and how long it is locked. */
const mostFailures = 8;
const windowMs = 15 * 60_000;
const lockMs = 15 * 60_000;

/** A hash that no password has: compared with where there is no such person, so that both take equally long. */
const nobodysHash = '$2b$11$1xE0o1f7mQp5S2vQWQvCLO1e2fE3nU9kqgC0D3cQ1i5m0V1wq3z1W';

function keyOf(email: string): string {
  return createHash('sha256').update(email).digest('hex');
}

async function refuseWhileLocked({ dataSource, now }: AppContext, key: string): Promise<void> {
  const [row] = await dataSource.query<{ locked_until: Date | null }[]>(
    'SELECT locked_until FROM sign_in_failures WHERE email_key = $1',
    [key],
  );
  const left = (row?.locked_until?.getTime() ?? 0) - now().getTime();
  if (left <= 0) return;
  const minutes = Math.ceil(left / 60_000);
  throw new DomainError(
    429,
    'locked',
    `Too many wrong passwords for this address: try again in ${String(minutes)} min`,
    [],
    {},
    { 'Retry-After': String(Math.ceil(left / 1000)) },
  );
}

/** Counts a wrong password; one statement, so that guesses sent at once are all counted. */
async function countFailure({ dataSource, now }: AppContext, key: string): Promise<void> {
  const at = now();
  await dataSource.query(
    `INSERT INTO sign_in_failures AS f (email_key, failures, first_at, locked_until) VALUES ($1, 1, $2, NULL)
     ON CONFLICT (email_key) DO UPDATE SET
       failures = CASE WHEN f.first_at < $3 THEN 1 ELSE f.failures + 1 END,
       first_at = CASE WHEN f.first_at < $3 THEN $2 ELSE f.first_at END,
       locked_until = CASE WHEN f.first_at >= $3 AND f.failures + 1 >= $5 THEN $4::timestamptz ELSE f.locked_until END`,
    [key, at, new Date(at.getTime() - windowMs), new Date(at.getTime() + lockMs), mostFailures],
  );
}

/**
 * Signs a person in, into the team used last or else the first by name.
 *
 * @throws DomainError 401 for a wrong address or password alike, 429 while the address is locked, 403 without a team
 */
export async function signIn(context: AppContext, input: { email: string; password: string }): Promise<IssuedSession> {
  const { dataSource, workers, now } = context;
  const email = input.email.toLowerCase();
  const key = keyOf(email);
  await refuseWhileLocked(context, key);
  const user = await dataSource.getRepository(User).findOneBy({ email });
  const fits = await workers.checkPassword(input.password, user?.passwordHash ?? nobodysHash);
  if (!user || !fits) {
    await countFailure(context, key);
    await refuseWhileLocked(context, key);
    throw new DomainError(401, 'wrong-sign-in', 'This e-mail address and password do not go together');
  }
  const [membership] = await dataSource.query<{ team_id: string }[]>(
    `SELECT m.team_id FROM memberships m JOIN teams t ON t.id = m.team_id
     LEFT JOIN sessions s ON s.user_id = m.user_id AND s.team_id = m.team_id
     WHERE m.user_id = $1 GROUP BY m.team_id, t.name ORDER BY max(s.created_at) DESC NULLS LAST, t.name LIMIT 1`,
    [user.id],
  );
  if (!membership) throw new DomainError(403, 'no-team', 'You do not belong to a team any more: ask its administrator');
  await dataSource.query('DELETE FROM sign_in_failures WHERE email_key = $1', [key]);
  const id = randomUUID();
  const refresh = newRefreshToken(id);
  const at = now();
  await dataSource.getRepository(Session).insert({
    id,
    userId: user.id,
    teamId: membership.team_id,
    refreshHash: refresh.hash,
    previousRefreshHash: null,
    rotatedAt: at,
    expiresAt: refresh.expiresAt(at),
    createdAt: at,
  });
  return { sessionId: id, refreshToken: refresh.token };
}

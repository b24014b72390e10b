import { randomUUID } from 'node:crypto';
import type { AppContext } from '../context.js';
import { Session, User } from '../database/entities/people.js';
import { DomainError } from '../errors.js';
import { guarded } from './lockOut.js';
import { newRefreshToken, type IssuedSession } from './sessions.js';

/** A hash that no password has: compared with where there is no such person, so that both take equally long. */
const nobodysHash = '$2b$11$1xE0o1f7mQp5S2vQWQvCLO1e2fE3nU9kqgC0D3cQ1i5m0V1wq3z1W';

/** The team of the person’s newest session, or else the first by name. */
async function findTeam({ dataSource }: AppContext, userId: string): Promise<string> {
  const [membership] = await dataSource.query<{ team_id: string }[]>(
    `SELECT m.team_id FROM memberships m JOIN teams t ON t.id = m.team_id
     LEFT JOIN sessions s ON s.user_id = m.user_id AND s.team_id = m.team_id
     WHERE m.user_id = $1 GROUP BY m.team_id, t.name ORDER BY max(s.created_at) DESC NULLS LAST, t.name LIMIT 1`,
    [userId],
  );
  if (!membership) throw new DomainError(403, 'no-team', 'You do not belong to a team any more: ask its administrator');
  return membership.team_id;
}

/**
 * Signs a person in, into the team used last or else the first by name.
 *
 * @throws DomainError 401 for a wrong address or password alike, 429 while the address is locked, 403 without a team
 */
export async function signIn(context: AppContext, input: { email: string; password: string }): Promise<IssuedSession> {
  const { dataSource, workers, now } = context;
  const email = input.email.toLowerCase();
  const user = await dataSource.getRepository(User).findOneBy({ email });
  const fits = await guarded(
    context,
    email,
    async () => (await workers.checkPassword(input.password, user?.passwordHash ?? nobodysHash)) && user !== null,
  );
  if (!user || !fits)
    throw new DomainError(401, 'wrong-sign-in', 'This e-mail address and password do not go together');
  const teamId = await findTeam(context, user.id);
  const id = randomUUID();
  const refresh = newRefreshToken(id);
  const at = now();
  await dataSource.transaction(async (manager) => {
    await manager.query('DELETE FROM sessions WHERE user_id = $1 AND expires_at <= $2', [user.id, at]);
    await manager.getRepository(Session).insert({
      id,
      userId: user.id,
      teamId,
      refreshHash: refresh.hash,
      previousRefreshHash: null,
      rotatedAt: at,
      expiresAt: refresh.expiresAt(at),
      createdAt: at,
    });
  });
  return { sessionId: id, refreshToken: refresh.token };
}

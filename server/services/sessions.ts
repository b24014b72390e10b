import { createHash, randomBytes } from 'node:crypto';
import { jwtVerify, SignJWT } from 'jose';
import type { Role } from '../../shared/roles.js';
import type { Session as SessionAnswer } from '../../shared/schemas/session.js';
import type { Actor, AppContext } from '../context.js';
import { DomainError, notFound } from '../errors.js';
import { guarded } from './lockOut.js';

/** Life of an access token, of a session without use, and of a refresh token that another tab has just replaced. */
export const accessSeconds = 10 * 60;
export const sessionDays = 30;
const graceMs = 30_000;

const issuer = 'trimwick';

export interface IssuedSession {
  sessionId: string;
  refreshToken: string;
}

function hashOf(secret: string): string {
  return createHash('sha256').update(secret).digest('base64url');
}

/** A refresh token “session.secret”; only the secret’s hash is kept. */
export function newRefreshToken(sessionId: string) {
  const secret = randomBytes(32).toString('base64url');
  return {
    token: `${sessionId}.${secret}`,
    hash: hashOf(secret),
    expiresAt: (from: Date) => new Date(from.getTime() + sessionDays * 86_400_000),
  };
}

export async function signAccessToken({ config, now }: AppContext, sessionId: string): Promise<string> {
  const seconds = Math.floor(now().getTime() / 1000);
  return new SignJWT({ sid: sessionId })
    .setProtectedHeader({ alg: 'HS256' })
    .setIssuer(issuer)
    .setIssuedAt(seconds)
    .setExpirationTime(seconds + accessSeconds)
    .sign(config.sessionKey);
}

/** The session that an access token speaks of, or null where it is not ours or is over. */
export async function readAccessToken({ config, now }: AppContext, token: string): Promise<string | null> {
  try {
    const { payload } = await jwtVerify(token, config.sessionKey, {
      issuer,
      algorithms: ['HS256'],
      currentDate: now(),
    });
    return typeof payload.sid === 'string' ? payload.sid : null;
  } catch {
    // Forged, foreign and expired tokens are all the same here: none.
    return null;
  }
}

interface SessionRow {
  refresh_hash: string;
  previous_refresh_hash: string | null;
  rotated_at: Date;
}

/**
 * Changes a refresh token for a new one. Two tabs that come with the same token at once both go on: the second is
 * within the grace. Any older token of the session was stolen, or its thief was faster: the session ends.
 *
 * @returns the session, with a new refresh token unless another tab has just made one; null where the token is worth nothing
 */
export async function rotateRefreshToken(
  context: AppContext,
  token: string,
): Promise<{ sessionId: string; refreshToken: string | null } | null> {
  const { dataSource, now } = context;
  const [sessionId, secret] = token.split('.');
  if (!sessionId || !secret || !/^[0-9a-f-]{36}$/i.test(sessionId)) return null;
  const at = now();
  const hash = hashOf(secret);
  const next = newRefreshToken(sessionId);
  // TypeORM answers an UPDATE with [rows, count].
  const [, changed] = await dataSource.query<[unknown, number]>(
    `UPDATE sessions SET refresh_hash = $3, previous_refresh_hash = refresh_hash, rotated_at = $4, expires_at = $5
     WHERE id = $1 AND refresh_hash = $2 AND expires_at > $4`,
    [sessionId, hash, next.hash, at, next.expiresAt(at)],
  );
  if (changed === 1) return { sessionId, refreshToken: next.token };
  const [row] = await dataSource.query<SessionRow[]>(
    'SELECT refresh_hash, previous_refresh_hash, rotated_at FROM sessions WHERE id = $1 AND expires_at > $2',
    [sessionId, at],
  );
  if (!row) return null;
  const justReplaced = row.previous_refresh_hash === hash && at.getTime() - row.rotated_at.getTime() <= graceMs;
  if (justReplaced) return { sessionId, refreshToken: null };
  // Only who once held a token of this session knows its id.
  await dataSource.query('DELETE FROM sessions WHERE id = $1', [sessionId]);
  return null;
}

/** Who a session belongs to, with roles as they are now; null where it has ended. */
export async function findActor({ dataSource, now }: AppContext, sessionId: string): Promise<Actor | null> {
  const [row] = await dataSource.query<
    { user_id: string; name: string; email: string; team_id: string; team_name: string; roles: Role[] }[]
  >(
    `SELECT u.id AS user_id, u.name, u.email, t.id AS team_id, t.name AS team_name, m.roles
     FROM sessions s
     JOIN memberships m ON m.team_id = s.team_id AND m.user_id = s.user_id
     JOIN users u ON u.id = s.user_id JOIN teams t ON t.id = s.team_id
     WHERE s.id = $1 AND s.expires_at > $2`,
    [sessionId, now()],
  );
  if (!row) return null;
  return {
    sessionId,
    userId: row.user_id,
    name: row.name,
    email: row.email,
    teamId: row.team_id,
    teamName: row.team_name,
    roles: row.roles,
  };
}

export async function describeSession({ dataSource }: AppContext, actor: Actor): Promise<SessionAnswer> {
  const teams = await dataSource.query<{ id: string; name: string }[]>(
    'SELECT t.id, t.name FROM memberships m JOIN teams t ON t.id = m.team_id WHERE m.user_id = $1 ORDER BY t.name',
    [actor.userId],
  );
  return {
    user: { id: actor.userId, name: actor.name, email: actor.email },
    team: { id: actor.teamId, name: actor.teamName },
    roles: actor.roles,
    teams,
  };
}

export async function signOut({ dataSource }: AppContext, actor: Actor): Promise<void> {
  await dataSource.query('DELETE FROM sessions WHERE id = $1', [actor.sessionId]);
}

/** Ends every session of a person, on every machine. */
export async function signOutEverywhere({ dataSource }: AppContext, actor: Actor): Promise<void> {
  await dataSource.query('DELETE FROM sessions WHERE user_id = $1', [actor.userId]);
}

/** Changes the session to another of the person’s teams. A team that is not one of them is not there. */
export async function changeTeam({ dataSource }: AppContext, actor: Actor, teamId: string): Promise<void> {
  const member = await dataSource.query<unknown[]>('SELECT 1 FROM memberships WHERE user_id = $1 AND team_id = $2', [
    actor.userId,
    teamId,
  ]);
  if (member.length === 0) throw notFound('team');
  await dataSource.query('UPDATE sessions SET team_id = $2 WHERE id = $1', [actor.sessionId, teamId]);
}

/**
 * Checks the present password again; wrong ones count as they do at sign-in.
 *
 * @throws DomainError 422 beside the given field, 429 while the account is locked
 */
export async function confirmPassword(
  context: AppContext,
  actor: Actor,
  password: string,
  path: string,
): Promise<void> {
  const fits = await guarded(context, actor.email, async () => {
    const [row] = await context.dataSource.query<{ password_hash: string }[]>(
      'SELECT password_hash FROM users WHERE id = $1',
      [actor.userId],
    );
    return row !== undefined && context.workers.checkPassword(password, row.password_hash);
  });
  if (fits) return;
  const message = 'This is not your password';
  throw new DomainError(422, 'wrong-password', message, [{ path, message }]);
}

/** Sets a new password and ends every other session of the person. */
export async function changePassword(
  context: AppContext,
  actor: Actor,
  input: { currentPassword: string; newPassword: string },
): Promise<void> {
  await confirmPassword(context, actor, input.currentPassword, '/currentPassword');
  const hash = await context.workers.hashPassword(input.newPassword);
  await context.dataSource.transaction(async (manager) => {
    await manager.query('UPDATE users SET password_hash = $2 WHERE id = $1', [actor.userId, hash]);
    await manager.query('DELETE FROM sessions WHERE user_id = $1 AND id <> $2', [actor.userId, actor.sessionId]);
  });
}

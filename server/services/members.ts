import { randomUUID } from 'node:crypto';
import type { Role } from '../../shared/roles.js';
import type { Member } from '../../shared/schemas/session.js';
import type { Actor, AppContext } from '../context.js';
import { conflict, notFound } from '../errors.js';

export async function listMembers({ dataSource }: AppContext, actor: Actor): Promise<Member[]> {
  return dataSource.query<Member[]>(
    `SELECT u.id, u.name, u.email, m.roles FROM memberships m JOIN users u ON u.id = m.user_id
     WHERE m.team_id = $1 ORDER BY lower(u.name)`,
    [actor.teamId],
  );
}

/**
 * Changes what a member may do. Every change is logged; a team keeps at least one administrator.
 *
 * @throws DomainError 404 for a person of another team, 409 for the last administrator
 */
export async function changeRoles(
  { dataSource, now }: AppContext,
  actor: Actor,
  userId: string,
  roles: Role[],
): Promise<Member> {
  return dataSource.transaction(async (manager) => {
    await manager.query('SELECT 1 FROM teams WHERE id = $1 FOR UPDATE', [actor.teamId]);
    const [member] = await manager.query<(Member & { roles: Role[] })[]>(
      `SELECT u.id, u.name, u.email, m.roles FROM memberships m JOIN users u ON u.id = m.user_id
       WHERE m.team_id = $1 AND m.user_id = $2`,
      [actor.teamId, userId],
    );
    if (!member) throw notFound('member');
    if (member.roles.includes('admin') && !roles.includes('admin')) {
      const [{ count }] = await manager.query<[{ count: string }]>(
        `SELECT count(*) FROM memberships WHERE team_id = $1 AND 'admin' = ANY(roles)`,
        [actor.teamId],
      );
      if (Number(count) <= 1) throw conflict('last-admin', 'A team keeps at least one administrator');
    }
    const distinct = [...new Set(roles)];
    await manager.query('UPDATE memberships SET roles = $3 WHERE team_id = $1 AND user_id = $2', [
      actor.teamId,
      userId,
      distinct,
    ]);
    await manager.query(
      'INSERT INTO audit_entries (id, team_id, actor_id, kind, detail, at) VALUES ($1, $2, $3, $4, $5, $6)',
      [
        randomUUID(),
        actor.teamId,
        actor.userId,
        'roles-changed',
        JSON.stringify({ userId, from: member.roles, to: distinct }),
        now(),
      ],
    );
    return { ...member, roles: distinct };
  });
}

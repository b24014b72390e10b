import type { Role } from '../../shared/roles.js';
import type { Member, Session } from '../../shared/schemas/session.js';
import { request } from './client.js';

export const signIn = (email: string, password: string) =>
  request<Session>('POST', '/session', { body: { email, password } });
export const fetchSession = () => request<Session>('GET', '/session');
export const signOut = () => request<undefined>('DELETE', '/session');
export const signOutEverywhere = () => request<undefined>('DELETE', '/sessions');
export const changeTeam = (teamId: string) => request<Session>('POST', '/session/team', { body: { teamId } });
export const changePassword = (currentPassword: string, newPassword: string) =>
  request<undefined>('PUT', '/account/password', { body: { currentPassword, newPassword } });
export const fetchMembers = () => request<{ items: Member[] }>('GET', '/members');
export const changeRoles = (userId: string, roles: Role[]) =>
  request<Member>('PUT', `/members/${userId}/roles`, { body: { roles } });

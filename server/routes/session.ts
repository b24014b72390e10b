import { changePasswordSchema, changeTeamSchema, sessionSchema, signInSchema } from '../../shared/schemas/session.js';
import { clearSessionCookies, setSessionCookies } from '../middleware/session.js';
import {
  changePassword,
  changeTeam,
  describeSession,
  findActor,
  signOut,
  signOutEverywhere,
} from '../services/sessions.js';
import { signIn } from '../services/signIn.js';
import { DomainError } from '../errors.js';
import { defineRoute } from './define.js';

const tag = 'Session';

export const sessionRoutes = [
  defineRoute({
    method: 'post',
    path: '/session',
    tag,
    summary: 'Sign in',
    access: 'public',
    body: signInSchema,
    answers: { status: 200, schema: sessionSchema },
    refusals: [
      { status: 401, when: 'Address and password do not go together' },
      { status: 403, when: 'No team any more, or a request of another site' },
      { status: 429, when: 'Too many wrong passwords; Retry-After says how long' },
    ],
    handle: async ({ context, input, request, response }) => {
      const session = await signIn(context, input.body);
      const actor = await findActor(context, session.sessionId);
      if (!actor) throw new DomainError(401, 'not-signed-in', 'Sign in again');
      await setSessionCookies(context, request, response, session);
      return describeSession(context, actor);
    },
  }),
  defineRoute({
    method: 'get',
    path: '/session',
    tag,
    summary: 'Who is signed in',
    access: 'read',
    answers: { status: 200, schema: sessionSchema },
    handle: ({ context, actor }) => describeSession(context, actor),
  }),
  defineRoute({
    method: 'delete',
    path: '/session',
    tag,
    summary: 'Sign out here',
    access: 'read',
    answers: { status: 204 },
    handle: async ({ context, actor, request, response }) => {
      await signOut(context, actor);
      clearSessionCookies(request, response);
    },
  }),
  defineRoute({
    method: 'delete',
    path: '/sessions',
    tag,
    summary: 'Sign out everywhere',
    access: 'read',
    answers: { status: 204 },
    handle: async ({ context, actor, request, response }) => {
      await signOutEverywhere(context, actor);
      clearSessionCookies(request, response);
    },
  }),
  defineRoute({
    method: 'post',
    path: '/session/team',
    tag,
    summary: 'Change to another of one’s teams',
    access: 'read',
    body: changeTeamSchema,
    answers: { status: 200, schema: sessionSchema },
    handle: async ({ context, actor, input }) => {
      await changeTeam(context, actor, input.body.teamId);
      const changed = await findActor(context, actor.sessionId);
      if (!changed) throw new DomainError(401, 'not-signed-in', 'Sign in again');
      return describeSession(context, changed);
    },
  }),
  defineRoute({
    method: 'put',
    path: '/account/password',
    tag,
    summary: 'Change one’s password; every other session ends',
    access: 'read',
    body: changePasswordSchema,
    answers: { status: 204 },
    refusals: [{ status: 429, when: 'Too many wrong passwords; Retry-After says how long' }],
    handle: ({ context, actor, input }) => changePassword(context, actor, input.body),
  }),
];

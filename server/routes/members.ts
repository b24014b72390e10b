import { z } from 'zod';
import { changeRolesSchema, memberSchema } from '../../shared/schemas/session.js';
import { changeRoles, listMembers } from '../services/members.js';
import { defineRoute } from './define.js';

const tag = 'Team';

export const memberRoutes = [
  defineRoute({
    method: 'get',
    path: '/members',
    tag,
    summary: 'The people of the team',
    access: 'read',
    answers: { status: 200, schema: z.object({ items: z.array(memberSchema) }) },
    handle: async ({ context, actor }) => ({ items: await listMembers(context, actor) }),
  }),
  defineRoute({
    method: 'put',
    path: '/members/:userId/roles',
    tag,
    summary: 'Change what a member may do',
    access: 'administer',
    params: z.object({ userId: z.uuid() }),
    body: changeRolesSchema,
    answers: { status: 200, schema: memberSchema },
    handle: ({ context, actor, input }) => changeRoles(context, actor, input.params.userId, input.body.roles),
  }),
];

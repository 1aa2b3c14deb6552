import { idParam } from '#shared/schemas/common.ts';
import {
  deskMemberAnswer,
  deskMembersAnswer,
  deskMembersQuery,
  suspendRequest,
  type DeskMemberAnswer,
} from '#shared/schemas/desk.ts';
import { lotParams, reasonRequest } from '#shared/schemas/lots.ts';
import { NotFoundError } from '#server/app-error.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { Lot } from '#server/models/lot.ts';
import type { Member } from '#server/models/member.ts';
import { defineRoute, type Actor, type RouteDefinition } from '#server/routing/define-route.ts';
import { searchMembers } from './desk-member-queries.ts';
import { canReinstate, canSuspend } from './member-policy.ts';
import { pullLot } from './pull-lot.ts';
import { reinstateMember, suspendMember } from './suspend-member.ts';

function presentDeskMember(member: Member, actor: Actor): DeskMemberAnswer {
  return {
    id: member.id,
    displayName: member.displayName,
    region: member.region,
    role: member.role,
    suspendedAt: member.suspendedAt?.toISOString() ?? null,
    suspensionReason: member.suspensionReason,
    can: { suspend: canSuspend(actor, member), reinstate: canReinstate(actor, member) },
  };
}

export const deskMemberRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/desk/members',
    summary: 'Find a member by name or e-mail; without a text, those who are suspended',
    access: 'desk',
    limit: 'read',
    query: deskMembersQuery,
    answer: deskMembersAnswer,
    handle: async ({ res, query, actor }) => {
      const members = await searchMembers(query.query);
      res.json({ members: members.map((member) => presentDeskMember(member, actor)) });
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/v1/desk/members/:id/suspend',
    summary: 'Suspend a member with a reason; all sessions end and open lots are paused',
    access: 'desk',
    limit: 'write',
    params: idParam,
    body: suspendRequest,
    answer: deskMemberAnswer,
    handle: async ({ res, params, body, actor }) => {
      const member = await withTransaction({ members: [params.id] }, (unit) =>
        suspendMember({ memberId: params.id, reason: body.reason }, unit, actor),
      );
      res.json(presentDeskMember(member, actor));
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/v1/desk/members/:id/reinstate',
    summary: 'Lift a suspension',
    access: 'desk',
    limit: 'write',
    params: idParam,
    answer: deskMemberAnswer,
    handle: async ({ res, params, actor }) => {
      const member = await withTransaction({ members: [params.id] }, (unit) =>
        reinstateMember(params.id, unit, actor),
      );
      res.json(presentDeskMember(member, actor));
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/v1/desk/lots/:code/pull',
    summary: 'Take a lot out of the market with a reason',
    access: 'desk',
    limit: 'write',
    params: lotParams,
    body: reasonRequest,
    handle: async ({ res, params, body, actor }) => {
      const found = await Lot.findOne({ where: { code: params.code }, attributes: ['id'] });
      if (found === null) throw new NotFoundError();
      const lot = await withTransaction({ lots: [found.id] }, (unit) =>
        pullLot({ lotId: found.id, reason: body.reason }, unit, actor),
      );
      res.json({ code: lot.code, state: lot.state });
    },
  }),
];

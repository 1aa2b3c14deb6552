import { isDeskStaff } from '#shared/roles.ts';
import { idParam } from '#shared/schemas/common.ts';
import { laboratoriesAnswer, laboratoryAnswer, laboratoryRequest } from '#shared/schemas/desk.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { presentLaboratory } from './laboratory-presenter.ts';
import { listLaboratories } from './laboratory-queries.ts';
import { addLaboratory, changeLaboratory } from './save-laboratory.ts';

export const laboratoryRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/laboratories',
    summary: 'The register of laboratories; staff also see those no longer active and how to reach them',
    access: 'member',
    limit: 'read',
    answer: laboratoriesAnswer,
    handle: async ({ res, actor }) => {
      const isForStaff = isDeskStaff(actor.role);
      const laboratories = await listLaboratories({ onlyActive: !isForStaff });
      res.json({ laboratories: laboratories.map((row) => presentLaboratory(row, isForStaff)) });
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/v1/laboratories',
    summary: 'Put a laboratory on the register',
    access: 'desk',
    limit: 'write',
    body: laboratoryRequest,
    answer: laboratoryAnswer,
    handle: async ({ res, body, actor }) => {
      const laboratory = await withTransaction({}, (unit) => addLaboratory(body, unit, actor));
      res.status(201).json(presentLaboratory(laboratory, true));
    },
  }),
  defineRoute({
    method: 'put',
    path: '/api/v1/laboratories/:id',
    summary: 'Change a laboratory of the register',
    access: 'desk',
    limit: 'write',
    params: idParam,
    body: laboratoryRequest,
    answer: laboratoryAnswer,
    handle: async ({ res, params, body, actor }) => {
      const laboratory = await withTransaction({}, (unit) =>
        changeLaboratory({ ...body, id: params.id }, unit, actor),
      );
      res.json(presentLaboratory(laboratory, true));
    },
  }),
];

import type { NextFunction, Request, Response } from 'express';
import { ANONYMOUS_SESSION_IDLE_HOURS } from '#shared/limits.ts';
import { profileRequest, sessionAnswer, signInRequest, signUpRequest } from '#shared/schemas/session.ts';
import { AppError } from '#server/app-error.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { csrfTokenOf } from '#server/middleware/csrf.ts';
import { signUpMember } from '#server/features/members/sign-up-member.ts';
import { actorOf, findMember } from '#server/features/members/member-queries.ts';
import { presentMember } from '#server/features/members/member-presenter.ts';
import { hashPassword } from '#server/features/members/passwords.ts';
import { updateProfile } from '#server/features/members/update-profile.ts';
import { defineRoute, type Actor, type RouteDefinition } from '#server/routing/define-route.ts';
import { SESSION_COOKIE } from './session-middleware.ts';
import { passport } from './passport.ts';

async function answerSession(
  req: Request,
  res: Response,
  memberId: string | null,
  status = 200,
): Promise<void> {
  const member = memberId === null ? null : await findMember(memberId);
  res
    .status(status)
    .json({ csrfToken: csrfTokenOf(req), member: member === null ? null : presentMember(member) });
}

/** Anyone at all can have such a session made, so its row goes soon; signing in makes another, with its own time. */
function keepShortly(req: Request): void {
  req.session.cookie.maxAge = ANONYMOUS_SESSION_IDLE_HOURS * 3_600_000;
}

function checkCredentials(req: Request, res: Response): Promise<Actor | null> {
  return new Promise((resolve, reject) => {
    const done = (error: unknown, user?: Express.User | false): void => {
      if (error) reject(error as Error);
      else resolve(user === false || user === undefined ? null : user);
    };
    (passport.authenticate('local', done) as (req: Request, res: Response, next: NextFunction) => void)(
      req,
      res,
      done,
    );
  });
}

/** `logIn` makes a new session id, so that an id planted before sign-in is worth nothing after it. */
function startSession(req: Request, actor: Actor): Promise<void> {
  return new Promise((resolve, reject) => {
    req.logIn(actor, (error: unknown) => {
      if (error) return reject(error as Error);
      req.session.signedInAt = new Date().toISOString();
      resolve();
    });
  });
}

export const sessionRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'get',
    path: '/api/v1/session',
    summary: 'Who is signed in, and the token that unsafe requests carry',
    access: 'public',
    limit: 'session',
    answer: sessionAnswer,
    handle: async ({ req, res, viewer }) => {
      // Nobody reads the token of an answer without a body; making one would leave a row for nothing.
      if (req.method === 'HEAD') return void res.status(200).end();
      if (viewer === null) keepShortly(req);
      await answerSession(req, res, viewer?.id ?? null);
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/v1/members',
    summary: 'Sign up',
    access: 'public',
    limit: 'sign-up',
    body: signUpRequest,
    answer: sessionAnswer,
    handle: async ({ req, res, body }) => {
      const { email, password, displayName, region, timeZone } = body;
      const passwordHash = await hashPassword(password);
      const member = await withTransaction({}, (unit) =>
        signUpMember({ email, passwordHash, displayName, region, timeZone }, unit),
      );
      await startSession(req, actorOf(member));
      await answerSession(req, res, member.id, 201);
    },
  }),
  defineRoute({
    method: 'post',
    path: '/api/v1/session',
    summary: 'Sign in',
    access: 'public',
    limit: 'sign-in',
    body: signInRequest,
    answer: sessionAnswer,
    handle: async ({ req, res }) => {
      const actor = await checkCredentials(req, res);
      if (actor === null) throw new AppError('wrong-credentials');
      await startSession(req, actor);
      await answerSession(req, res, actor.id);
    },
  }),
  defineRoute({
    method: 'delete',
    path: '/api/v1/session',
    summary: 'Sign out',
    access: 'member',
    limit: 'write',
    whileSuspended: true,
    handle: ({ req, res }) =>
      new Promise<void>((resolve, reject) => {
        req.session.destroy((error: unknown) => {
          if (error) return reject(error as Error);
          res.clearCookie(SESSION_COOKIE, { path: '/' }).status(204).end();
          resolve();
        });
      }),
  }),
  defineRoute({
    method: 'put',
    path: '/api/v1/me/profile',
    summary: 'Change name, region, weight unit and time zone',
    access: 'member',
    limit: 'write',
    body: profileRequest,
    answer: sessionAnswer,
    handle: async ({ req, res, body, actor }) => {
      await withTransaction({ members: [actor.id] }, (unit) => updateProfile(actor.id, body, unit));
      await answerSession(req, res, actor.id);
    },
  }),
];

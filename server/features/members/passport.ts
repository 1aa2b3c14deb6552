import passport from 'passport';
import { Strategy as LocalStrategy } from 'passport-local';
import { findMember, findMemberByEmail, actorOf } from '#server/features/members/member-queries.ts';
import { isPasswordRight } from '#server/features/members/passwords.ts';
import type { Actor } from '#server/routing/define-route.ts';

declare global {
  // eslint-disable-next-line @typescript-eslint/no-namespace -- the library's own way of typing `req.user`
  namespace Express {
    // eslint-disable-next-line @typescript-eslint/no-empty-object-type -- merges ours into the library's
    interface User extends Actor {}
  }
}

passport.use(
  new LocalStrategy({ usernameField: 'email' }, (email, password, done) => {
    void (async () => {
      const member = await findMemberByEmail(email);
      const isRight = await isPasswordRight(member?.passwordHash ?? null, password);
      return isRight && member !== null ? actorOf(member) : null;
    })().then(
      (actor) => done(null, actor ?? false),
      (error: unknown) => done(error),
    );
  }),
);

passport.serializeUser((user, done) => done(null, user.id));

passport.deserializeUser((id: string, done) => {
  findMember(id).then(
    (member) => done(null, member === null ? false : actorOf(member)),
    (error: unknown) => done(error),
  );
});

export { passport };

/** Sign-in comes first: nobody gets past this without a live session, whatever the address. */
import type { RequestHandler } from 'express';
import passport from 'passport';
import { Strategy } from 'passport-jwt';
import type { AppDeps } from '../http/deps.ts';
import { Problem } from '../http/problems.ts';
import { type SignedInPerson, setPerson } from '../http/request-facts.ts';
import { personOfSession } from './sessions.ts';
import { ACCESS_COOKIE, type AccessClaims, accessTokenRules } from './tokens.ts';

type GuardDeps = Pick<AppDeps, 'databases' | 'secrets' | 'clock'>;

/** @param isPublic tells the few addresses that need no sign-in */
export function signInGuard(
  deps: GuardDeps,
  isPublic: (method: string, path: string) => boolean,
): RequestHandler {
  const authenticator = new passport.Passport();
  authenticator.use(accessStrategy(deps));
  return (req, res, next) => {
    if (isPublic(req.method, req.path)) {
      next();
      return;
    }
    const judge: passport.AuthenticateCallback = (error, person, info) => {
      if (error) next(error);
      else if (person) {
        setPerson(res, person as unknown as SignedInPerson);
        next();
      } else next(info instanceof Problem ? info : new Problem('not_signed_in'));
    };
    authenticator.authenticate('jwt', { session: false }, judge)(req, res, next);
  };
}

function accessStrategy({ databases, secrets, clock }: GuardDeps): Strategy {
  return new Strategy(
    {
      ...accessTokenRules,
      secretOrKey: secrets.jwtKey,
      jwtFromRequest: (req: { cookies?: Record<string, unknown> }) => {
        const token = req.cookies?.[ACCESS_COOKIE];
        return typeof token === 'string' ? token : null;
      },
    },
    (claims: AccessClaims, done) => {
      const now = clock();
      if (claims.exp * 1_000 <= now.getTime()) {
        done(null, false, new Problem('not_signed_in'));
        return;
      }
      // A signed token alone is not enough: the session may have been ended on the server.
      personOfSession(databases.masked, claims.sid, now).then((found) => {
        if (found === null) done(null, false, new Problem('not_signed_in'));
        else if (typeof found === 'string') {
          done(null, false, new Problem('session_ended', { why: found }));
        } else done(null, { ...found, accessExpiresAt: new Date(claims.exp * 1_000) });
      }, done);
    },
  );
}

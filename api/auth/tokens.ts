/** Tokens and the cookies that carry them. None of them can be read by a script of a page. */
import { createHash, randomBytes } from 'node:crypto';
import type { CookieOptions, Response } from 'express';
import jwt from 'jsonwebtoken';

export const ACCESS_COOKIE = 'tether_access';
export const REFRESH_COOKIE = 'tether_refresh';
/** Marks a browser from which this account was signed in before; see sign-in-limits.ts. */
export const DEVICE_COOKIE = 'tether_device';

export const ACCESS_MINUTES = 5;
const DEVICE_DAYS = 180;

const ACCESS = 'access';
const DEVICE = 'device';

export interface AccessClaims {
  /** Uid of the session. */
  sid: string;
  /** Seconds since 1970. */
  exp: number;
}

export function signAccess(jwtKey: string, sessionUid: string, now: Date, until: Date): string {
  const iat = seconds(now);
  return jwt.sign({ sid: sessionUid, iat, exp: seconds(until) }, jwtKey, {
    algorithm: 'HS256',
    audience: ACCESS,
  });
}

/** What the strategy asks of a token; expiry is judged by the injected clock instead. */
export const accessTokenRules = {
  algorithms: ['HS256' as const],
  audience: ACCESS,
  ignoreExpiration: true,
};

export function signDevice(jwtKey: string, device: string, emailPrint: string, now: Date): string {
  return jwt.sign({ dev: device, iat: seconds(now) }, jwtKey, {
    algorithm: 'HS256',
    audience: DEVICE,
    subject: emailPrint,
  });
}

/** @returns the mark of a browser known to this account, or null */
export function readDevice(
  jwtKey: string,
  cookie: unknown,
  emailPrint: string,
  now: Date,
): string | null {
  if (typeof cookie !== 'string') return null;
  try {
    const claims = jwt.verify(cookie, jwtKey, {
      algorithms: ['HS256'],
      audience: DEVICE,
      subject: emailPrint,
      ignoreExpiration: true,
    });
    if (typeof claims === 'string' || typeof claims.dev !== 'string') return null;
    const age = seconds(now) - (claims.iat ?? 0);
    return age <= DEVICE_DAYS * 86_400 ? claims.dev : null;
  } catch (error) {
    // A mark of another account or a made-up one is no mark.
    if (error instanceof jwt.JsonWebTokenError) return null;
    throw error;
  }
}

/** 256 random bits; only their hash is stored. */
export function newOpaqueToken(): string {
  return randomBytes(32).toString('base64url');
}

export function tokenHash(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

export interface SessionTokens {
  access: string;
  accessExpiresAt: Date;
  refresh: string;
  absoluteExpiresAt: Date;
}

export function setSessionCookies(
  res: Response,
  tokens: SessionTokens,
  secure: boolean,
  now: Date,
): void {
  const age = (until: Date) => Math.max(0, until.getTime() - now.getTime());
  res.cookie(ACCESS_COOKIE, tokens.access, {
    ...options('/', secure),
    maxAge: age(tokens.accessExpiresAt),
  });
  res.cookie(REFRESH_COOKIE, tokens.refresh, {
    ...options('/api/refresh', secure),
    maxAge: age(tokens.absoluteExpiresAt),
  });
}

export function clearSessionCookies(res: Response, secure: boolean): void {
  res.clearCookie(ACCESS_COOKIE, options('/', secure));
  res.clearCookie(REFRESH_COOKIE, options('/api/refresh', secure));
}

export function setDeviceCookie(res: Response, device: string, secure: boolean): void {
  res.cookie(DEVICE_COOKIE, device, {
    ...options('/api/sign-in', secure),
    maxAge: DEVICE_DAYS * 86_400_000,
  });
}

function options(path: string, secure: boolean): CookieOptions {
  return { httpOnly: true, sameSite: 'strict', secure, path };
}

function seconds(moment: Date): number {
  return Math.floor(moment.getTime() / 1_000);
}

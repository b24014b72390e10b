import type { CookieOptions, NextFunction, Request, Response } from 'express';
import type { Actor, AppContext } from '../context.js';
import { DomainError } from '../errors.js';
import {
  accessSeconds,
  findActor,
  readAccessToken,
  rotateRefreshToken,
  sessionDays,
  signAccessToken,
} from '../services/sessions.js';

const accessCookie = 'trimwick_access';
const refreshCookie = 'trimwick_refresh';
/** Says only that there is a session, so that a page without one need not ask. It opens nothing. */
const presentCookie = 'trimwick_present';

function presentOptions(request: Request, seconds: number): CookieOptions {
  return { ...cookieOptions(request, seconds), httpOnly: false, path: '/' };
}

function cookieOptions(request: Request, seconds: number): CookieOptions {
  return { httpOnly: true, sameSite: 'strict', secure: request.secure, path: '/api', maxAge: seconds * 1000 };
}

export async function setSessionCookies(
  context: AppContext,
  request: Request,
  response: Response,
  session: { sessionId: string; refreshToken: string | null },
): Promise<void> {
  const access = await signAccessToken(context, session.sessionId);
  response.cookie(accessCookie, access, cookieOptions(request, accessSeconds));
  if (session.refreshToken !== null) {
    response.cookie(refreshCookie, session.refreshToken, cookieOptions(request, sessionDays * 86_400));
    response.cookie(presentCookie, 'marker', presentOptions(request, sessionDays * 86_400));
  }
}

export function clearSessionCookies(request: Request, response: Response): void {
  for (const name of [accessCookie, refreshCookie]) response.clearCookie(name, cookieOptions(request, 0));
  response.clearCookie(presentCookie, presentOptions(request, 0));
}

/** Finds who asks: by the access token, or by changing the refresh token where that has run out. */
async function identify(context: AppContext, request: Request, response: Response): Promise<Actor | null> {
  const cookies = request.cookies as Record<string, string | undefined>;
  const access = cookies[accessCookie];
  const named = access === undefined ? null : await readAccessToken(context, access);
  if (named !== null) return findActor(context, named);
  const refresh = cookies[refreshCookie];
  if (refresh === undefined) return null;
  const rotated = await rotateRefreshToken(context, refresh);
  if (rotated === null) {
    clearSessionCookies(request, response);
    return null;
  }
  await setSessionCookies(context, request, response, rotated);
  return findActor(context, rotated.sessionId);
}

/** Lets only signed-in people pass; `response.locals.actor` is who. */
export function requireSession(context: AppContext) {
  return async (request: Request, response: Response, next: NextFunction): Promise<void> => {
    const actor = await identify(context, request, response);
    if (actor === null) throw new DomainError(401, 'not-signed-in', 'Sign in first');
    response.locals.actor = actor;
    next();
  };
}

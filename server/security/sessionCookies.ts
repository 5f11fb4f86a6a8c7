import type { CookieOptions, Request, Response } from 'express';
import type { Config } from '../config/config.js';

export const renewalPath = '/api/v1/session';

/** Over https the browser itself enforces by the name's prefix that the cookie came from this host, securely. */
export function sessionCookies(config: Pick<Config, 'publicUrl'>) {
  const isHttps = config.publicUrl.startsWith('https:');
  const accessName = isHttps ? '__Host-overfold_access' : 'overfold_access';
  // The renewal cookie goes to one path only, which `__Host-` does not allow.
  const renewalName = isHttps ? '__Secure-overfold_renewal' : 'overfold_renewal';
  const common: CookieOptions = { httpOnly: true, sameSite: 'strict', secure: isHttps };

  return {
    accessName,
    renewalName,
    readAccess: (req: Request): string | undefined => readCookie(req, accessName),
    readRenewal: (req: Request): string | undefined => readCookie(req, renewalName),
    /** Both live as long as the session may: an expired access token then answers "expired", not "nobody". */
    write(res: Response, tokens: { token: string; renewalToken: string; sessionExpiresAt: Date }): void {
      res.cookie(accessName, tokens.token, { ...common, path: '/', expires: tokens.sessionExpiresAt });
      res.cookie(renewalName, tokens.renewalToken, { ...common, path: renewalPath, expires: tokens.sessionExpiresAt });
    },
    clear(res: Response): void {
      res.clearCookie(accessName, { ...common, path: '/' });
      res.clearCookie(renewalName, { ...common, path: renewalPath });
    },
  };
}

function readCookie(req: Request, name: string): string | undefined {
  const cookies = req.cookies as Record<string, unknown> | undefined;
  const value = cookies?.[name];
  return typeof value === 'string' && value !== '' ? value : undefined;
}

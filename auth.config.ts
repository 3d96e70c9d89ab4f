import Credentials from '@auth/core/providers/credentials';
import type { AuthConfig } from '@auth/core/types';
import { authorizeLink, authorizePassword } from './src/server/auth/authorize';
import { authLogger } from './src/server/auth/authLogger';
import { authSecret } from './src/server/auth/secret';
import { config } from './src/server/config';

const DAY_S = 86_400;

/**
 * Auth.js as this application uses it: sessions are encrypted tokens in a cookie, started by a password
 * or by a link from a mail. Secret and address are read when they are needed, never at build time.
 * No endpoint of Auth.js is served; src/server/auth/session.ts is the only caller.
 */
export default {
  basePath: '/api/auth',
  trustHost: true,
  get secret() {
    return authSecret();
  },
  get useSecureCookies() {
    return config().publicUrl.startsWith('https:');
  },
  session: { strategy: 'jwt', maxAge: 30 * DAY_S },
  providers: [
    Credentials({
      id: 'password',
      credentials: { email: {}, password: {} },
      authorize: authorizePassword,
    }),
    Credentials({
      id: 'link',
      credentials: { secret: {}, purpose: {}, password: {} },
      authorize: authorizeLink,
    }),
  ],
  callbacks: {
    /** The instant of signing in stays in the token: later ends of sessions are compared with it. */
    jwt: ({ token, user, trigger }) =>
      trigger === 'signIn' ? { sub: user.id ?? '', signedInAtMs: Date.now() } : token,
    session: ({ session, token }) =>
      Object.assign(session, {
        personId: token.sub,
        signedInAtMs: token['signedInAtMs'],
        issuedAtS: token['iat'],
      }),
  },
  logger: authLogger,
} satisfies AuthConfig;

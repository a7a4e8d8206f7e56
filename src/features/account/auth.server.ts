import { betterAuth } from 'better-auth';
import { config } from '@/server/config';
import { queueMail } from '@/server/mail';
import { sequelize } from '@/server/models';
import { sequelizeAdapter } from './adapter/index.server';
import { existingLetter, resetLetter, verifyLetter } from './emails/letters';

const DAY = 86_400;
const times = { createdAt: 'created_at', updatedAt: 'updated_at' };
const LOOPBACK = new Set(['localhost', '127.0.0.1', '[::1]']);

/** Origins that a request may come from: the public address and, on this machine itself, its other names. */
export function trustedOrigins(request?: Request): string[] {
  const { PUBLIC_URL } = config();
  const origins = [new URL(PUBLIC_URL).origin];
  const own = request ? new URL(request.url) : null;
  if (own && LOOPBACK.has(own.hostname) && LOOPBACK.has(new URL(PUBLIC_URL).hostname))
    origins.push(own.origin);
  return origins;
}

const make = () => {
  const { AUTH_SECRET, PUBLIC_URL, LOG_LEVEL } = config();
  return betterAuth({
    appName: 'Thrum',
    baseURL: PUBLIC_URL,
    secret: AUTH_SECRET,
    database: sequelizeAdapter(sequelize),
    trustedOrigins: (request) => trustedOrigins(request),
    emailAndPassword: {
      enabled: true,
      requireEmailVerification: true,
      minPasswordLength: 10,
      maxPasswordLength: 200,
      revokeSessionsOnPasswordReset: true,
      sendResetPassword: ({ user, url }) => queueMail(resetLetter(user.email, url)),
      // Signing up with a known address looks the same to a stranger; its owner is told.
      onExistingUserSignUp: ({ user }) => queueMail(existingLetter(user.email, `${PUBLIC_URL}/sign-in`)),
    },
    emailVerification: {
      sendOnSignUp: true,
      sendOnSignIn: true,
      autoSignInAfterVerification: true,
      expiresIn: 3600,
      sendVerificationEmail: ({ user, url }) => queueMail(verifyLetter(user.email, url)),
    },
    session: {
      modelName: 'sessions',
      expiresIn: 14 * DAY,
      updateAge: DAY,
      fields: {
        ...times,
        userId: 'user_id',
        expiresAt: 'expires_at',
        ipAddress: 'ip_address',
        userAgent: 'user_agent',
      },
    },
    user: { modelName: 'users', fields: { ...times, emailVerified: 'email_verified' } },
    account: {
      modelName: 'accounts',
      fields: {
        ...times,
        accountId: 'account_id',
        providerId: 'provider_id',
        userId: 'user_id',
        accessToken: 'access_token',
        refreshToken: 'refresh_token',
        idToken: 'id_token',
        accessTokenExpiresAt: 'access_token_expires_at',
        refreshTokenExpiresAt: 'refresh_token_expires_at',
      },
    },
    verification: { modelName: 'verifications', fields: { ...times, expiresAt: 'expires_at' } },
    rateLimit: {
      enabled: true,
      storage: 'database',
      modelName: 'rate_limits',
      fields: { lastRequest: 'last_request' },
      window: 60,
      max: 300,
      customRules: {
        '/sign-in/email': { window: 60, max: 100 },
        '/sign-up/email': { window: 60, max: 20 },
        '/request-password-reset': { window: 60, max: 10 },
      },
    },
    logger: { disabled: LOG_LEVEL === 'silent' },
    telemetry: { enabled: false },
  });
};

let instance: ReturnType<typeof make> | undefined;

/** The one better-auth instance; made on first use, so that importing this file needs no configuration. */
export const auth = (): ReturnType<typeof make> => (instance ??= make());

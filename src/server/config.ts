import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import type { Backoff } from './mail/backoff';

const port = z.coerce.number().int().min(1).max(65535);

const environmentSchema = z.object({
  PUBLIC_URL: z.url({ protocol: /^https?$/ }),
  HOST: z.string().default('127.0.0.1'),
  PORT: port.default(4321),
  DATA_DIR: z.string().min(1),
  SMTP_HOST: z.string().min(1),
  SMTP_PORT: port.default(587),
  SMTP_USER: z.string().optional(),
  SMTP_PASSWORD: z.string().optional(),
  SMTP_TLS: z.enum(['none', 'starttls', 'tls']).default('starttls'),
  MAIL_FROM: z.string().min(3),
  INBOUND_ADDRESS: z.email().optional(),
  INBOUND_SECRET: z.string().min(16).optional(),
  INBOUND_FOLDER: z.string().optional(),
  MAIL_LEASE_SECONDS: z.coerce.number().min(1).max(3600).default(60),
  MAIL_RETRY_FIRST_SECONDS: z.coerce.number().min(0.1).max(3600).default(15),
  MAIL_RETRY_LONGEST_SECONDS: z.coerce.number().min(0.1).max(86_400).default(3600),
  TRUST_PROXY: z.enum(['yes', 'no']).default('no'),
  CALCULATOR_REQUESTS_PER_MINUTE: z.coerce.number().int().min(1).default(120),
  SIGN_IN_ATTEMPTS_PER_MINUTE: z.coerce.number().int().min(1).default(10),
  LOG_LEVEL: z.enum(['silent', 'error', 'warn', 'info', 'debug']).default('info'),
  DEMO: z.enum(['yes', 'no']).default('no'),
});

export interface Config {
  /** Origin of every link that leaves the server, without a trailing slash. */
  publicUrl: string;
  host: string;
  port: number;
  dataDir: string;
  databaseFile: string;
  smtp: {
    host: string;
    port: number;
    user: string | undefined;
    password: string | undefined;
    tls: 'none' | 'starttls' | 'tls';
    from: string;
  };
  /** Mail that comes in. */
  inbound: {
    /** Answers go to this address, with "+token" before the @ for each person and sked. Null: none are received. */
    address: string | null;
    /** What a mail server shows when it hands a mail in over HTTP. Null: that way is closed. */
    secret: string | null;
    /** Maildir that the worker empties. Null: that way is closed. */
    folder: string | null;
  };
  /** How long a mail taken by the worker is its own; after that another attempt is made. */
  mailLeaseMs: number;
  /** How long a mail that was not taken waits for its next attempt. */
  mailRetry: Backoff;
  /** Whether X-Forwarded-For comes from a proxy that sets it. */
  trustProxy: boolean;
  calculatorRequestsPerMinute: number;
  signInAttemptsPerMinute: number;
  logLevel: string;
  /** Shows the demo sign-ins on the sign-in page. Never set in production. */
  demo: boolean;
}

export class ConfigurationMissing extends Error {
  constructor(sentence: string) {
    super(sentence);
    this.name = 'ConfigurationMissing';
  }
}

/** Reads the environment. Throws `ConfigurationMissing` with one sentence naming everything that is wrong. */
export function readConfig(environment: NodeJS.ProcessEnv): Config {
  const given = Object.fromEntries(
    Object.entries(environment).filter(([, value]) => value !== undefined && value !== ''),
  );
  const parsed = environmentSchema.safeParse(given);
  if (!parsed.success) {
    const wrong = parsed.error.issues.map((issue) => {
      const name = String(issue.path[0]);
      if (!(name in given)) return `${name} is missing`;
      return /SECRET|PASSWORD/.test(name)
        ? `${name} is not usable`
        : `${name} is "${given[name]}", which is not usable`;
    });
    throw new ConfigurationMissing(
      `Echotide cannot start: ${wrong.join('; ')}. .env.example explains each setting.`,
    );
  }
  const env = parsed.data;
  return {
    publicUrl: new URL(env.PUBLIC_URL).origin,
    host: env.HOST,
    port: env.PORT,
    ...readDataFiles(given),
    smtp: {
      host: env.SMTP_HOST,
      port: env.SMTP_PORT,
      user: env.SMTP_USER,
      password: env.SMTP_PASSWORD,
      tls: env.SMTP_TLS,
      from: env.MAIL_FROM,
    },
    inbound: {
      // In lower case, as the addresses are read to which an answer comes.
      address: env.INBOUND_ADDRESS?.toLowerCase() ?? null,
      secret: env.INBOUND_SECRET ?? null,
      folder: env.INBOUND_FOLDER === undefined ? null : path.resolve(env.INBOUND_FOLDER),
    },
    mailLeaseMs: Math.round(env.MAIL_LEASE_SECONDS * 1000),
    mailRetry: {
      firstMs: Math.round(env.MAIL_RETRY_FIRST_SECONDS * 1000),
      longestMs: Math.round(env.MAIL_RETRY_LONGEST_SECONDS * 1000),
    },
    trustProxy: env.TRUST_PROXY === 'yes',
    calculatorRequestsPerMinute: env.CALCULATOR_REQUESTS_PER_MINUTE,
    signInAttemptsPerMinute: env.SIGN_IN_ATTEMPTS_PER_MINUTE,
    logLevel: env.LOG_LEVEL,
    demo: env.DEMO === 'yes',
  };
}

/** The data folder and database file alone, for commands that need nothing else. */
export function readDataFiles(
  environment: NodeJS.ProcessEnv,
): Pick<Config, 'dataDir' | 'databaseFile'> {
  if (!environment['DATA_DIR']) {
    throw new ConfigurationMissing('DATA_DIR is missing: name the folder that holds the database.');
  }
  const dataDir = path.resolve(environment['DATA_DIR']);
  return { dataDir, databaseFile: path.join(dataDir, 'echotide.sqlite') };
}

let current: Config | undefined;

/** The configuration of this process, read once. */
export function config(): Config {
  if (!current) {
    current = readConfig(process.env);
    mkdirSync(current.dataDir, { recursive: true, mode: 0o700 });
  }
  return current;
}

import { z } from 'zod';

const port = z.coerce.number().int().min(1).max(65535);
const flag = z.enum(['0', '1']).transform((value) => value === '1');

/** The environment the server reads, all of it, with defaults that suit the demo farm on one machine. */
const environment = z.object({
  NODE_ENV: z.enum(['development', 'production', 'test']).default('production'),
  HOST: z.string().default('0.0.0.0'),
  PORT: port.default(3000),
  DATA_DIR: z.string().default('data'),
  PUBLIC_URL: z.url().optional(),
  TRUST_PROXY: z.coerce.number().int().min(0).max(5).default(0),
  DEMO: flag.default(false),
  LOG_LEVEL: z.enum(['silent', 'error', 'warn', 'info', 'debug']).default('info'),
  SMTP_URL: z.url().default('smtp://127.0.0.1:2525'),
  MAIL_FROM: z.string().default('Limestead <farm@example.com>'),
  STRIPE_SECRET_KEY: z.string().default('sk_test_limestead'),
  STRIPE_WEBHOOK_SECRET: z.string().default('whsec_limestead_demo'),
  /** Where the payment service answers; empty means the real one. */
  STRIPE_API_URL: z.union([z.url(), z.literal('')]).default('http://127.0.0.1:4242'),
});

export interface Config {
  mode: 'development' | 'production' | 'test';
  host: string;
  port: number;
  dataDir: string;
  publicUrl: string;
  trustProxy: number;
  demo: boolean;
  logLevel: string;
  smtpUrl: string;
  mailFrom: string;
  stripe: { secretKey: string; webhookSecret: string; apiUrl: string };
}

/**
 * Reads and checks the environment once, at start.
 * @throws {Error} naming each variable that is wrong and why
 */
export function readConfig(env: Readonly<Record<string, string | undefined>>): Config {
  const parsed = environment.safeParse(env);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`These settings need attention:\n${lines.join('\n')}`);
  }
  const value = parsed.data;
  return {
    mode: value.NODE_ENV,
    host: value.HOST,
    port: value.PORT,
    dataDir: value.DATA_DIR,
    publicUrl: (value.PUBLIC_URL ?? `http://localhost:${value.PORT}`).replace(/\/$/, ''),
    trustProxy: value.TRUST_PROXY,
    demo: value.DEMO,
    logLevel: value.LOG_LEVEL,
    smtpUrl: value.SMTP_URL,
    mailFrom: value.MAIL_FROM,
    stripe: {
      secretKey: value.STRIPE_SECRET_KEY,
      webhookSecret: value.STRIPE_WEBHOOK_SECRET,
      apiUrl: value.STRIPE_API_URL,
    },
  };
}

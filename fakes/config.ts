import { z } from 'zod';

const port = z.coerce.number().int().min(0).max(65_535);

/** The environment of the stand-ins, with what each variable is when it is not set. */
const Environment = z.object({
  FAKE_HOST: z.string().min(1).default('127.0.0.1'),
  FAKE_PAYMENTS_PORT: port.default(4242),
  /** Address of the payment page for browsers, where it is not the host and port above. */
  FAKE_PAYMENTS_URL: z.url({ protocol: /^https?$/ }).optional(),
  FAKE_SMTP_PORT: port.default(2525),
  FAKE_MAIL_PORT: port.default(8025),
  FAKE_WEBHOOK_URL: z.url({ protocol: /^https?$/ }).default('http://127.0.0.1:3000/api/webhooks/payments'),
  FAKE_STRIPE_KEY: z.string().min(1).default('sk_test_limestead'),
  FAKE_WEBHOOK_SECRET: z.string().min(1).default('whsec_limestead_demo'),
  /** Folder that keeps payments over a restart. */
  FAKE_DATA_DIR: z.string().min(1).optional(),
});
type Environment = z.infer<typeof Environment>;

/** Reads the environment, or throws one error that names every wrong variable. */
export function readEnvironment(env: Record<string, string | undefined>): Environment {
  const result = Environment.safeParse(env);
  if (result.success) return result.data;
  const problems = result.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
  throw new Error(`The stand-ins can't start. Correct these environment variables:\n${problems.join('\n')}`);
}

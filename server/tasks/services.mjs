/** Ports and addresses of one start, from the environment, and what each process is told of them. */
export function serviceSettings({ empty }) {
  const env = process.env;
  const port = env.PORT ?? '3000';
  const paymentsPort = env.FAKE_PAYMENTS_PORT ?? '4242';
  const smtpPort = env.FAKE_SMTP_PORT ?? '2525';
  const mailPort = env.FAKE_MAIL_PORT ?? '8025';
  const stripeKey = env.STRIPE_SECRET_KEY ?? 'sk_test_limestead';
  const webhookSecret = env.STRIPE_WEBHOOK_SECRET ?? 'whsec_limestead_demo';
  const dataDir = env.DATA_DIR ?? (empty ? 'data/farm' : 'data/demo');
  return {
    port,
    dataDir,
    mailPage: `http://localhost:${mailPort}`,
    paymentEvents: `http://localhost:${paymentsPort}/_events`,
    /** A farm that names real services gets no stand-ins. */
    withFakes: !env.STRIPE_API_URL && !env.SMTP_URL,
    server: {
      PORT: port,
      DATA_DIR: dataDir,
      DEMO: empty ? '0' : '1',
      LOG_LEVEL: env.LOG_LEVEL ?? 'warn',
      STRIPE_SECRET_KEY: stripeKey,
      STRIPE_WEBHOOK_SECRET: webhookSecret,
      STRIPE_API_URL: env.STRIPE_API_URL ?? `http://127.0.0.1:${paymentsPort}`,
      SMTP_URL: env.SMTP_URL ?? `smtp://127.0.0.1:${smtpPort}`,
    },
    fakes: {
      FAKE_PAYMENTS_PORT: paymentsPort,
      FAKE_SMTP_PORT: smtpPort,
      FAKE_MAIL_PORT: mailPort,
      FAKE_STRIPE_KEY: stripeKey,
      FAKE_WEBHOOK_SECRET: webhookSecret,
      FAKE_WEBHOOK_URL: `http://127.0.0.1:${port}/api/webhooks/payments`,
    },
  };
}

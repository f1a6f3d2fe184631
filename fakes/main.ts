import { readEnvironment } from './config.ts';
import { startMail } from './mail/server.ts';
import { startPayments } from './payments/server.ts';

async function main(): Promise<void> {
  const env = readEnvironment(process.env);
  const payments = await startPayments({
    host: env.FAKE_HOST,
    port: env.FAKE_PAYMENTS_PORT,
    apiKey: env.FAKE_STRIPE_KEY,
    webhookUrl: env.FAKE_WEBHOOK_URL,
    webhookSecret: env.FAKE_WEBHOOK_SECRET,
    ...(env.FAKE_PAYMENTS_URL !== undefined && { publicUrl: env.FAKE_PAYMENTS_URL.replace(/\/$/, '') }),
    ...(env.FAKE_DATA_DIR !== undefined && { dataDir: env.FAKE_DATA_DIR }),
  }).catch((error: unknown) => fail('FAKE_PAYMENTS_PORT', error));
  const mail = await startMail({
    host: env.FAKE_HOST,
    smtpPort: env.FAKE_SMTP_PORT,
    webPort: env.FAKE_MAIL_PORT,
  }).catch(async (error: unknown) => {
    await payments.close();
    return fail('FAKE_SMTP_PORT or FAKE_MAIL_PORT', error);
  });

  console.log(
    `Payments stand-in: ${payments.url} (webhooks to ${env.FAKE_WEBHOOK_URL}, seen at ${payments.url}/_events)`,
  );
  console.log(`Mail stand-in: ${mail.url} (SMTP on port ${mail.ports.smtp})`);

  const stop = () => {
    void Promise.all([payments.close(), mail.close()]).then(() => process.exit(0));
  };
  process.once('SIGTERM', stop);
  process.once('SIGINT', stop);
}

/** Names the variable to change beside the reason. */
function fail(variable: string, error: unknown): never {
  const reason = error instanceof Error ? error.message : String(error);
  throw new Error(`${reason} (set by ${variable})`, { cause: error });
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
});

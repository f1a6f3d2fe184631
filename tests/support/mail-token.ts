import { sendDueMails } from '../../server/jobs/send-due-mails.ts';
import type { TestFarm } from './start-farm.ts';

/** The secret in the link of the newest mail to this address, once the mails that are due went out. */
export async function mailedToken(farm: TestFarm, to: string): Promise<string> {
  await sendDueMails(farm.deps);
  const mail = farm.mails.findLast((each) => each.to === to);
  const token = /\/(?:invitation|reset-password)\/([\w-]{43})\b/.exec(mail?.text ?? '')?.[1];
  if (!token) throw new Error(`There is no link in a mail to ${to}.`);
  return token;
}

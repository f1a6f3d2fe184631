import { z } from 'zod';
import type { Deps } from '../../deps.ts';
import { farmOf } from '../../queries/farm.ts';
import type { MailBody } from '../mail-templates.ts';
import { mailBody } from './mail-layout.ts';

const Data = z.object({ token: z.string(), name: z.string() });

/** The link to set a new password. */
export function passwordResetMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const { token, name } = Data.parse(data);
  const farmName = farmOf(deps.db).name;
  return mailBody({
    subject: `Set a new password for ${farmName}`,
    farmName,
    heading: 'Set a new password',
    paragraphs: [
      `Hello ${name},`,
      'someone asked for a new password for this e-mail address. If it was you, choose one within the next hour.',
    ],
    act: { label: 'Choose a new password', url: `${deps.config.publicUrl}/reset-password/${token}` },
    note: 'If it was not you, leave this mail alone: your password stays as it is. The link works once.',
  });
}

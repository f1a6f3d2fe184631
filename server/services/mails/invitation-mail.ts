import { z } from 'zod';
import { ROLE_LABELS, ROLES } from '../../../shared/permissions.ts';
import type { Deps } from '../../deps.ts';
import { farmOf } from '../../queries/farm.ts';
import type { MailBody } from '../mail-templates.ts';
import { mailBody } from './mail-layout.ts';

const Data = z.object({
  token: z.string(),
  role: z.enum(ROLES),
  storeName: z.string().nullable(),
  invitedBy: z.string(),
});

/** The link with which an invited person sets a name and a password. */
export function invitationMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const { token, role, storeName, invitedBy } = Data.parse(data);
  const farmName = farmOf(deps.db).name;
  return mailBody({
    subject: `${farmName} invites you`,
    farmName,
    heading: `Join ${farmName}`,
    paragraphs: [
      storeName === null
        ? `${invitedBy} invites you to work with ${farmName} on Limestead, the farm's record of water, stock and orders.`
        : `${invitedBy} invites you to order from ${farmName} for ${storeName}.`,
    ],
    rows: [
      { label: 'Your role', value: ROLE_LABELS[role] },
      ...(storeName === null ? [] : [{ label: 'Store', value: storeName }]),
    ],
    act: { label: 'Accept the invitation', url: `${deps.config.publicUrl}/invitation/${token}` },
    note: 'The link works once and for seven days. If you did not expect it, leave this mail alone.',
  });
}

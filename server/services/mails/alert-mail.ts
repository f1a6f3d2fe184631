import { asc, inArray } from 'drizzle-orm';
import { z } from 'zod';
import { systemTitle } from '../../../shared/domain/system-title.ts';
import { alerts } from '../../db/schema/index.ts';
import type { Deps } from '../../deps.ts';
import { alertWords } from '../../queries/alert-words.ts';
import type { AlertRow } from '../../queries/alerts.ts';
import { farmOf } from '../../queries/farm.ts';
import { systemRow } from '../../queries/systems.ts';
import type { MailBody } from '../mail-templates.ts';
import { mailBody } from './mail-layout.ts';
import { plainWords } from './plain-words.ts';

const Data = z.object({ alertIds: z.array(z.string()).min(1) });
const MOST_ALERTS = 12;

/** What was raised in the last minute, as it stands when the mail goes out. */
export function alertMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const { alertIds } = Data.parse(data);
  const { name: farmName, timeZone } = farmOf(deps.db);
  const rows = deps.db
    .select()
    .from(alerts)
    .where(inArray(alerts.id, alertIds))
    .orderBy(asc(alerts.announcement))
    .all();
  const told = rows.slice(0, MOST_ALERTS).map((row) => toldOf(deps, row, timeZone));
  const [first] = told;
  const heading = told.length === 1 && first ? first.title : `${rows.length} alerts`;
  return mailBody({
    subject: told.length === 1 || !first ? heading : `${heading}: ${first.title}`,
    ...{ farmName, heading },
    paragraphs: [
      ...told.map(({ title, detail }) => (told.length === 1 ? detail : `${title}. ${detail}`)),
      ...(rows.length > told.length ? [`And ${rows.length - told.length} more.`] : []),
    ],
    act: { label: 'Open Today', url: `${deps.config.publicUrl}/today` },
    note: mailChoiceNote(deps),
  });
}

/** Why someone gets such mails, and where to end them. */
export function mailChoiceNote({ config }: Deps): string {
  return `You chose these mails. Change or end them under your account: ${config.publicUrl}/account`;
}

function toldOf(deps: Deps, row: AlertRow, timeZone: string): { title: string; detail: string } {
  const words = alertWords(row.facts, systemTitle(systemRow(deps.db, row.systemId)), deps.clock.now());
  const ended = row.closedAt === null ? '' : ' It has ended meanwhile.';
  return {
    title: plainWords(words.title, timeZone),
    detail: `${plainWords(words.detail, timeZone)}${ended}`,
  };
}

import type { LogEntry, LogSubject } from '../../../shared/contracts/system-log.ts';
import type { Db } from '../../db/client.ts';
import type { SystemRow } from '../systems.ts';

export interface LogPart {
  /** Entries before this instant. */
  before: number;
  /** So many of the newest. */
  limit: number;
}

/** One kind of thing that happens in a system, newest first. */
export interface LogSource {
  subject: LogSubject;
  read: (db: Db, system: SystemRow, part: LogPart) => LogEntry[];
}

import { eq } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { readingPhotos } from '../db/schema/index.ts';
import type { FileAnswer } from '../file-answer.ts';

/** @throws {DomainError} `record.not_found` */
export function readingPhoto(db: Db, photoId: string): FileAnswer {
  const row = db.select().from(readingPhotos).where(eq(readingPhotos.id, photoId)).get();
  if (!row) throw new DomainError('record.not_found', 'This photo is gone.');
  const fileName = `slip.${row.contentType.slice('image/'.length)}`;
  return { fileName, contentType: row.contentType, content: row.content, inline: true };
}

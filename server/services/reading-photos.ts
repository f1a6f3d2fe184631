import { and, eq, lt, sql } from 'drizzle-orm';
import type { PHOTO_TYPES } from '../../shared/contracts/reading-photos.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { readingPhotos, readings } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';

type PhotoType = (typeof PHOTO_TYPES)[number];

/** How files of a kind begin; what a browser says of a file is only its name's ending. */
const BEGINNINGS: readonly [PhotoType, (content: Buffer) => boolean][] = [
  ['image/jpeg', (content) => content.subarray(0, 3).toString('hex') === 'ffd8ff'],
  ['image/png', (content) => content.subarray(0, 8).toString('hex') === '89504e470d0a1a0a'],
  [
    'image/webp',
    (content) => content.toString('latin1', 0, 4) === 'RIFF' && content.toString('latin1', 8, 12) === 'WEBP',
  ],
];

/** Keeps a picture until readings name it. @throws {DomainError} `upload.wrong_type` for what is no such picture */
export function addReadingPhoto(write: Write, content: Buffer): { id: string } {
  const [contentType] = BEGINNINGS.find(([, fits]) => fits(content)) ?? [];
  if (!contentType) {
    const message = 'This is no JPEG, PNG or WebP picture. Take the photo again, or choose another file.';
    throw new DomainError('upload.wrong_type', message, { fields: [{ path: 'photo', message }] });
  }
  const id = write.newId();
  const { name, userId } = write.actor;
  write.tx.insert(readingPhotos).values({ id, contentType, content, at: write.now, by: name, byUserId: userId }).run();
  const after = { contentType, bytes: content.length };
  write.audit({ action: 'reading_photo.added', entity: 'reading_photo', entityId: id, after });
  return { id };
}

/** Only one's own picture can be put to a reading. @throws {DomainError} `input.invalid` */
export function assertOwnPhoto(write: Write, photoId: string): void {
  const photo = write.tx
    .select({ byUserId: readingPhotos.byUserId })
    .from(readingPhotos)
    .where(eq(readingPhotos.id, photoId))
    .get();
  if (photo && photo.byUserId === write.actor.userId) return;
  const message = 'This photo is gone. Take it again.';
  throw new DomainError('input.invalid', message, { fields: [{ path: 'photoId', message }] });
}

/** Pictures that no reading names a day after they were sent are of no use. */
export function forgetLoosePhotos({ db, clock }: Pick<Deps, 'db' | 'clock'>): void {
  const isNamed = sql`EXISTS (SELECT 1 FROM ${readings} WHERE ${readings.photoId} = ${readingPhotos.id})`;
  db.delete(readingPhotos)
    .where(and(lt(readingPhotos.at, clock.now() - MS_PER_DAY), sql`NOT ${isNamed}`))
    .run();
}

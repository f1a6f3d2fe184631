import { readingPhotoEndpoints } from '../../shared/contracts/reading-photos.ts';
import type { Api } from '../http/api.ts';
import { readingPhoto } from '../queries/reading-photos.ts';
import { addReadingPhoto } from '../services/reading-photos.ts';

export function readingPhotoRoutes(api: Api): void {
  api.read(readingPhotoEndpoints.show, (db, { params }) => readingPhoto(db, params.id));
  api.write(readingPhotoEndpoints.add, (write, { upload }) => addReadingPhoto(write, upload.content));
}

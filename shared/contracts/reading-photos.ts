import { z } from 'zod';
import { id, idParams, nothing } from './common.ts';
import type { Endpoint } from './endpoint.ts';

export const PHOTO_MAX_BYTES = 4_000_000;
export const PHOTO_TYPES = ['image/jpeg', 'image/png', 'image/webp'] as const;

export const readingPhotoEndpoints = {
  add: {
    method: 'post',
    path: '/api/reading-photos',
    access: 'water.log',
    summary: 'Send a picture of a slip, to be named by the readings that stand on it',
    body: nothing,
    upload: { field: 'photo', maxBytes: PHOTO_MAX_BYTES, types: PHOTO_TYPES },
    response: z.object({ id }),
    creates: true,
  },
  show: {
    method: 'get',
    path: '/api/reading-photos/:id',
    access: 'water.read',
    summary: 'The picture of a slip',
    params: idParams,
    answer: 'file',
  },
} as const satisfies Record<string, Endpoint>;

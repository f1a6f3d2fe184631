import { z } from 'zod';
import type { Endpoint } from './endpoint.ts';

/** What anyone who scans a plug may read, and nothing more: no cost, no place, no counts. */
export const PublicPlug = z.strictObject({
  code: z.string(),
  lineCode: z.string(),
  tradeName: z.string(),
  taxon: z.string(),
  publicText: z.string(),
  careText: z.string(),
  /** Month of the cut, `YYYY-MM`. */
  cutMonth: z.string(),
  farmName: z.string(),
});
export type PublicPlug = z.infer<typeof PublicPlug>;

export const publicEndpoints = {
  plug: {
    method: 'get',
    path: '/api/public/plugs/:code',
    access: 'public',
    summary: 'The public side of a plug: its line, cut month and care',
    params: z.strictObject({ code: z.string().min(1).max(200) }),
    response: PublicPlug,
  },
} as const satisfies Record<string, Endpoint>;

import { done } from './common.ts';
import type { Endpoint } from './endpoint.ts';

export const healthEndpoints = {
  health: {
    method: 'get',
    path: '/api/health',
    access: 'public',
    summary: 'The server is up',
    response: done,
  },
  ready: {
    method: 'get',
    path: '/api/ready',
    access: 'public',
    summary: 'The server can reach its database',
    response: done,
  },
} as const satisfies Record<string, Endpoint>;

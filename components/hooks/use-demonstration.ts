import { z } from 'zod';
import { request } from './request';

/** Makes the reader a student of the demonstration, and says where it is. */
export function enterDemonstration(): Promise<{ collaboration: string }> {
  return request('/api/v1/demonstration', z.object({ collaboration: z.string() }), {
    method: 'POST',
    body: {},
  });
}

import { answer } from './answer';
import { request } from './request';

/** Makes the reader a student of the demonstration, and says where it is. */
export function enterDemonstration(): Promise<{ collaboration: string }> {
  return request('/api/v1/demonstration', answer('collaborationAnswerSchema'), {
    method: 'POST',
    body: {},
  });
}

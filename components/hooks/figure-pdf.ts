import { apiPath } from './api-path';
import { requestFile } from './request';

/** A figure of the page as PDF, made by the server from its SVG. */
export function figurePdf(collaboration: string, svg: string): Promise<Blob> {
  return requestFile(apiPath(collaboration, 'figures'), {
    method: 'POST',
    content: new Blob([svg], { type: 'image/svg+xml' }),
  });
}

/** Bytes whose number is known before they are made, part by part. */
interface Parts {
  size: number;
  parts(): AsyncIterable<Uint8Array>;
}

export interface Attached {
  fileName: string;
  contentType: string;
  content: Parts | Uint8Array | string;
}

/**
 * The name of a file to save, as RFC 6266 writes it: letters that every browser takes, and the full
 * name beside them where it has others.
 */
export function contentDisposition(fileName: string): string {
  const plain = fileName
    .normalize('NFKD')
    .replace(/\p{Mn}/gu, '')
    .replace(/[^\x20-\x7e]|["\\%/]/gu, '_');
  const encoded = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (sign) => `%${sign.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  const more = plain === fileName ? '' : `; filename*=UTF-8''${encoded}`;
  return `attachment; filename="${plain}"${more}`;
}

/** A part is made when the one before has gone out, so that a large file never lies in memory. */
function streamOf(content: Parts): ReadableStream<Uint8Array> {
  const parts = content.parts()[Symbol.asyncIterator]();
  return new ReadableStream<Uint8Array>(
    {
      async pull(controller) {
        const { done, value } = await parts.next();
        if (done) controller.close();
        else controller.enqueue(value);
      },
      async cancel() {
        await parts.return?.();
      },
    },
    { highWaterMark: 1 },
  );
}

/** A file to be saved; no browser runs anything of it. */
export function attachment({ fileName, contentType, content }: Attached): Response {
  const isStream = typeof content === 'object' && 'parts' in content;
  const body = isStream ? streamOf(content) : (content as BodyInit);
  return new Response(body, {
    headers: {
      'Content-Type': contentType,
      'Content-Disposition': contentDisposition(fileName),
      ...(isStream && { 'Content-Length': String(content.size) }),
    },
  });
}

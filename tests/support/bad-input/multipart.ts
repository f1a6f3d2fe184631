/** One field of a multipart form; it is a file where it has a name for one. */
export interface Part {
  name: string;
  content: string | Buffer;
  fileName?: string;
  contentType?: string;
}

const BOUNDARY = 'a-line-that-no-part-holds';

/** The body of a multipart form and the header that belongs to it. */
export function multipart(parts: readonly Part[]): { body: Buffer; headers: Record<string, string> } {
  const chunks = parts.flatMap(({ name, content, fileName, contentType }) => {
    const file = fileName === undefined ? '' : `; filename="${fileName}"`;
    const type = contentType === undefined ? '' : `Content-Type: ${contentType}\r\n`;
    const head = `--${BOUNDARY}\r\nContent-Disposition: form-data; name="${name}"${file}\r\n${type}\r\n`;
    return [Buffer.from(head), Buffer.from(content), Buffer.from('\r\n')];
  });
  return {
    body: Buffer.concat([...chunks, Buffer.from(`--${BOUNDARY}--\r\n`)]),
    headers: { 'Content-Type': `multipart/form-data; boundary=${BOUNDARY}` },
  };
}

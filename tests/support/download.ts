import type supertest from 'supertest';

/** Receives the bytes of a file: supertest would try to read them as text. */
export function bytesOf(request: supertest.Test): supertest.Test {
  return request.buffer(true).parse((response, done) => {
    const chunks: Buffer[] = [];
    response.on('data', (chunk: Buffer) => chunks.push(chunk));
    response.on('end', () => {
      done(null, Buffer.concat(chunks));
    });
  });
}

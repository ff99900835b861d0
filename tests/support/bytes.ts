import type { Test } from 'supertest';

/** The bytes of an answer, whatever its type. */
export async function bytesOf(test: Test): Promise<{ bytes: Buffer; headers: Record<string, string> }> {
  const { body, headers } = await test
    .buffer(true)
    .parse((response, done) => {
      const chunks: Buffer[] = [];
      response.on('data', (chunk: Buffer) => chunks.push(chunk));
      response.on('end', () => done(null, Buffer.concat(chunks)));
    })
    .expect(200);
  return { bytes: body as Buffer, headers: headers as Record<string, string> };
}

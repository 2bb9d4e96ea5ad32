import type { Client } from './client.ts';

/** The bytes of a file as the API serves them. */
export async function fileBytes(client: Client, fileId: string): Promise<Buffer> {
  const response = await client
    .prepare('get', `/api/files/${fileId}`)
    .buffer(true)
    .parse((stream, done) => {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => done(null, Buffer.concat(chunks)));
    });
  if (response.status !== 200) throw new Error(`file ${fileId} gave ${response.status}`);
  return response.body as Buffer;
}

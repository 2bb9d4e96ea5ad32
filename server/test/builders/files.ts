import sharp from 'sharp';
import type { Response } from 'supertest';
import type { FileKind, UploadResult } from '@kerfyard/common/files';
import { expectStatus, type Person } from './people.ts';

export interface Upload {
  name: string;
  type: string;
  bytes: Buffer;
}

/** Send files as the app's pages do. */
export function upload(
  person: Person,
  kind: string,
  files: readonly Upload[],
  idempotencyKey?: string,
): Promise<Response> {
  const sending = person.client.prepare('post', '/api/files', { idempotencyKey }).field('kind', kind);
  for (const { name, type, bytes } of files) {
    sending.attach('files', bytes, { filename: name, contentType: type });
  }
  return Promise.resolve(sending) as Promise<Response>;
}

/** Send files that are all taken; their ids. */
export async function uploadFiles(
  person: Person,
  kind: FileKind,
  files: readonly Upload[],
): Promise<string[]> {
  const { body } = await expectStatus(upload(person, kind, files), 201);
  const { files: taken, refused } = body as UploadResult;
  if (refused.length > 0) throw new Error(`refused: ${JSON.stringify(refused)}`);
  return taken.map((file) => file.id);
}

/** A small picture of one colour, different for each `seed`. */
export async function jpegPhoto(name = 'wall.jpg', seed = 1): Promise<Upload> {
  const background = { r: (seed * 37) % 256, g: (seed * 91) % 256, b: 120 };
  const bytes = await sharp({ create: { width: 640, height: 480, channels: 3, background } })
    .jpeg()
    .toBuffer();
  return { name, type: 'image/jpeg', bytes };
}

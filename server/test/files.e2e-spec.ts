import { createHash, randomBytes, randomUUID } from 'node:crypto';
import { execFileSync } from 'node:child_process';
import { readdirSync, statSync } from 'node:fs';
import { connect } from 'node:net';
import { join } from 'node:path';
import sharp from 'sharp';
import type { FileView, UploadResult } from '@kerfyard/common/files';
import { jpegPhoto, upload, uploadFiles, type Upload } from './builders/files.ts';
import {
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from './builders/people.ts';
import { baseUrl } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { fileBytes } from './file-bytes.ts';
import { plainPdf } from './pdf-samples.ts';
import { blankPng } from './png-samples.ts';

jest.setTimeout(60_000);

let gc: Company;
let crew: Company;

beforeAll(async () => {
  [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
});
afterAll(closeDatabase);

const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex');
const resultOf = async (kind: string, files: Upload[]) =>
  (await expectStatus(upload(gc.owner, kind, files), 201)).body as UploadResult;
const onlyRefusal = async (kind: string, file: Upload) => {
  const { files, refused } = await resultOf(kind, [file]);
  expect(files).toEqual([]);
  return refused[0];
};
const read = (path: string, person = gc.owner) => person.client.get(path);

describe('uploading', () => {
  it('D-41 keeps the time and the hash of a phone’s photo and nothing else of its EXIF', async () => {
    const bytes = await sharp({ create: { width: 900, height: 600, channels: 3, background: '#8a7755' } })
      .jpeg()
      .withExif({
        IFD0: { Model: 'Pocket 3' },
        IFD2: { DateTimeOriginal: '2026:11:20 09:12:33', OffsetTimeOriginal: '-05:00' },
        IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '39/1 44/1 0/1' },
      })
      .withMetadata({ orientation: 6 })
      .withXmp('<x:xmpmeta xmlns:x="adobe:ns:meta/"><secret/></x:xmpmeta>')
      .toBuffer();
    const tail = Buffer.from('<script>alert(1)</script>PK\u0003\u0004');
    const sent = Buffer.concat([bytes, tail]);
    const { files } = await resultOf('photo', [{ name: 'IMG 1.jpg', type: 'image/jpeg', bytes: sent }]);
    const [view] = files as [FileView];
    // Orientation 6 is a quarter turn: what is kept stands upright.
    expect(view).toMatchObject({ width: 600, height: 900, takenAt: '2026-11-20T14:12:33.000Z', pages: null });

    const [row] = await sql<{ original_sha256: string }>('SELECT original_sha256 FROM file WHERE id = $1', [
      view.id,
    ]);
    expect(row?.original_sha256).toBe(sha256(sent));
    for (const size of ['full', 'thumb']) {
      const kept = await fileBytes(gc.owner.client, `${view.id}?size=${size}`);
      const metadata = await sharp(kept).metadata();
      expect(metadata.exif).toBeUndefined();
      expect(metadata.xmp).toBeUndefined();
      expect(kept.toString('latin1')).not.toMatch(/Exif|GPS|xmpmeta|<script>|Pocket/);
      if (size === 'full') expect(sha256(kept)).toBe(view.sha256);
      else expect([metadata.format, metadata.width, metadata.height]).toEqual(['webp', 320, 480]);
    }
  });

  it('does not make up an instant when the camera says no offset', async () => {
    const bytes = await sharp({ create: { width: 60, height: 60, channels: 3, background: '#555' } })
      .jpeg()
      .withExif({ IFD2: { DateTimeOriginal: '2026:11:20 09:12:33' } })
      .toBuffer();
    const { files } = await resultOf('photo', [{ name: 'a.jpg', type: 'image/jpeg', bytes }]);
    expect(files[0]?.takenAt).toBeNull();
  });

  it('D-40 refuses what is not a picture or a PDF, whatever it calls itself', async () => {
    const zip = Buffer.concat([Buffer.from('PK\u0003\u0004\u0014\u0000'), randomBytes(300)]);
    const wrong: [string, Buffer][] = [
      ['svg', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>')],
      ['html', Buffer.from('<!doctype html><script>alert(1)</script>')],
      ['xml', Buffer.from('<?xml version="1.0"?><a/>')],
      ['gif script', Buffer.from('GIF89a/*\u0001\u0001*/=1;alert(1)//')],
      ['zip', zip],
      ['gzip', Buffer.from([0x1f, 0x8b, 8, 0, 0, 0, 0, 0, 0, 3])],
      ['elf', Buffer.concat([Buffer.from('\u007fELF'), Buffer.alloc(60)])],
      ['exe', Buffer.concat([Buffer.from('MZ'), Buffer.alloc(200)])],
      ['text', Buffer.from('just words')],
      ['bmp', Buffer.concat([Buffer.from('BM'), Buffer.alloc(80)])],
      ['tiff', Buffer.concat([Buffer.from('II*\u0000'), Buffer.alloc(80)])],
      ['random', randomBytes(400)],
    ];
    for (const [label, bytes] of wrong) {
      for (const [name, type] of [
        ['a.jpg', 'image/jpeg'],
        ['a.pdf', 'application/pdf'],
      ] as const) {
        const refusal = await onlyRefusal('drawing', { name, type, bytes });
        expect([label, name, refusal?.code]).toEqual([label, name, 'wrong_type']);
      }
    }
  });

  it('D-40 wants name, declared type and content to agree', async () => {
    const jpeg = (await jpegPhoto()).bytes;
    const liars: Upload[] = [
      { name: 'a.png', type: 'image/jpeg', bytes: jpeg },
      { name: 'a.jpg', type: 'image/png', bytes: jpeg },
      { name: 'a', type: 'image/jpeg', bytes: jpeg },
      { name: 'a.jpg.svg', type: 'image/jpeg', bytes: jpeg },
      { name: 'a.jpg', type: 'text/html', bytes: jpeg },
    ];
    for (const liar of liars) expect((await onlyRefusal('photo', liar))?.code).toBe('wrong_type');
    const pdf = { name: 'a.pdf', type: 'application/pdf', bytes: await plainPdf() };
    expect((await onlyRefusal('photo', pdf))?.code).toBe('wrong_type');
  });

  it('D-42 refuses a pixel bomb and cut-off pictures without growing', async () => {
    const bomb = blankPng(12_000, 12_000);
    expect(bomb.length).toBeLessThan(1_000_000);
    const before = appMemoryKb();
    expect((await onlyRefusal('photo', { name: 'b.png', type: 'image/png', bytes: bomb }))?.code).toBe(
      'too_large',
    );
    const noisy = await sharp(randomBytes(400 * 300 * 3), { raw: { width: 400, height: 300, channels: 3 } });
    for (const [type, bytes] of [
      ['image/jpeg', await noisy.clone().jpeg().toBuffer()],
      ['image/png', await noisy.clone().png().toBuffer()],
      ['image/webp', await noisy.clone().webp().toBuffer()],
    ] as const) {
      const name = `a.${type.slice(6)}`;
      const cut = bytes.subarray(0, Math.round(bytes.length * 0.6));
      expect([type, (await onlyRefusal('photo', { name, type, bytes: cut }))?.code]).toEqual([
        type,
        'unreadable',
      ]);
    }
    expect(appMemoryKb() - before).toBeLessThan(300_000);
  });

  it('keeps the good files of a request and says which are not taken and why', async () => {
    const files: Upload[] = [
      await jpegPhoto('first.jpg', 1),
      { name: 'notes.jpg', type: 'image/jpeg', bytes: Buffer.from('no picture') },
      {
        name: 'big.jpg',
        type: 'image/jpeg',
        bytes: Buffer.concat([(await jpegPhoto()).bytes, Buffer.alloc(25 * 1024 * 1024)]),
      },
      { name: 'empty.jpg', type: 'image/jpeg', bytes: Buffer.alloc(0) },
      await jpegPhoto('last.jpg', 2),
    ];
    const { files: taken, refused } = await resultOf('photo', files);
    expect(taken.map((file) => file.name)).toEqual(['first.jpg', 'last.jpg']);
    expect(refused.map((file) => [file.name, file.code])).toEqual([
      ['notes.jpg', 'wrong_type'],
      ['big.jpg', 'too_large'],
      ['empty.jpg', 'unreadable'],
    ]);
    for (const { message } of refused) expect(message.length).toBeGreaterThan(10);
  });

  it('takes ten files and names the eleventh', async () => {
    const photo = await jpegPhoto();
    const files = Array.from({ length: 11 }, (_, n) => ({ ...photo, name: `p${n}.jpg` }));
    const { files: taken, refused } = await resultOf('photo', files);
    expect(taken).toHaveLength(10);
    expect(refused.map((file) => [file.name, file.code])).toEqual([['p10.jpg', 'too_many']]);
  });

  it('D-44 keeps names as data: no folders, control characters or overrides', async () => {
    const { bytes } = await jpegPhoto();
    const type = 'image/jpeg';
    const named = async (name: string) => (await resultOf('photo', [{ name, type, bytes }])).files[0]?.name;
    expect(await named('../../etc/wall.jpg')).toBe('wall.jpg');
    expect(await named('wall\u202egpj.jpg')).toBe('wallgpj.jpg');
    expect(await named('Pläne Ebene 2 – №7.jpg')).toBe('Pläne Ebene 2 – №7.jpg');
    expect(await named('CON.jpg')).toBe('file CON.jpg');
    expect((await named(`${'a'.repeat(5000)}.jpg`))?.length).toBe(200);
  });

  it('D-28 refuses a company whose room is used up', async () => {
    const full = await makeGeneralContractor();
    await sql(
      `INSERT INTO file (id, company_id, uploaded_by, kind, name, type, bytes, sha256, original_sha256)
       VALUES ($1, $2, $3, 'photo', 'x.jpg', 'image/jpeg', $4, repeat('0', 64), repeat('0', 64))`,
      [randomUUID(), full.id, full.owner.userId, 20 * 1024 ** 3 - 100],
    );
    const { body } = await expectStatus(upload(full.owner, 'photo', [await jpegPhoto()]), 201);
    expect((body as UploadResult).refused).toMatchObject([{ code: 'too_large', message: /space for files/ }]);
  });

  it('does one thing when the same request comes twice, and refuses its key for other files', async () => {
    const key = randomUUID();
    const photo = await jpegPhoto('once.jpg', 9);
    const first = await expectStatus(upload(gc.owner, 'photo', [photo], key), 201);
    const again = await expectStatus(upload(gc.owner, 'photo', [photo], key), 201);
    expect((again.body as UploadResult).files).toEqual((first.body as UploadResult).files);
    await expectStatus(upload(gc.owner, 'photo', [await jpegPhoto('other.jpg', 10)], key), 409);
  });

  it('answers 401, 415 and 422 to what is no upload', async () => {
    const photo = await jpegPhoto();
    const stranger = { ...gc.owner, client: gc.owner.client.tab() };
    stranger.client.cookies.clear();
    await expectStatus(upload(stranger, 'photo', [photo]), 401);
    await expectStatus(gc.owner.client.post('/api/files', { kind: 'photo' }), 415);
    await expectStatus(upload(gc.owner, 'photo', []), 422);
    const kind = await expectStatus(upload(gc.owner, 'painting', [photo]), 422);
    expect(kind.body.error.fields[0].path).toBe('kind');
    const extra = gc.owner.client
      .prepare('post', '/api/files')
      .field('kind', 'photo')
      .field('companyId', crew.id)
      .attach('files', photo.bytes, { filename: photo.name, contentType: photo.type });
    expect((await extra).status).toBe(422);
    const elsewhere = gc.owner.client
      .prepare('post', '/api/files')
      .field('kind', 'photo')
      .attach('other', photo.bytes, { filename: photo.name, contentType: photo.type });
    expect((await elsewhere).status).toBe(422);
  });
});

describe('limits while reading', () => {
  it('D-46 refuses a length that is too much before reading it', async () => {
    const answer = await raw({ 'Content-Length': String(2 * 1024 ** 3) }, '--x\r\n');
    expect(answer).toMatch(/^HTTP\/1\.1 413 /);
  });

  it('D-46 refuses too many parts', async () => {
    const part = (n: number) =>
      `--x\r\nContent-Disposition: form-data; name="files"; filename="a${n}.jpg"\r\nContent-Type: image/jpeg\r\n\r\nz\r\n`;
    const body = `${Array.from({ length: 1001 }, (_, n) => part(n)).join('')}--x--\r\n`;
    const answer = await raw({ 'Content-Length': String(Buffer.byteLength(body)) }, body);
    expect(answer).toMatch(/^HTTP\/1\.1 413 /);
  });

  it('D-46 leaves nothing behind of an upload that breaks off', async () => {
    const incoming = join(process.env.TEST_FILES_DIR ?? '', 'incoming');
    const head =
      '--x\r\nContent-Disposition: form-data; name="files"; filename="a.jpg"\r\nContent-Type: image/jpeg\r\n\r\n';
    await raw({ 'Content-Length': '9000000' }, head + 'z'.repeat(200_000), { breakOffAfterMs: 200 });
    for (let tries = 0; tries < 50 && readdirSync(incoming).length > 0; tries += 1) {
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    expect(readdirSync(incoming)).toEqual([]);
  });
});

describe('reading', () => {
  let photoId: string;
  let drawingId: string;

  beforeAll(async () => {
    [photoId] = (await uploadFiles(gc.owner, 'photo', [await jpegPhoto('Wand – Nord "1".jpg', 5)])) as [
      string,
    ];
    const drawing = { name: 'A-101.pdf', type: 'application/pdf', bytes: await plainPdf(3) };
    [drawingId] = (await uploadFiles(gc.owner, 'drawing', [drawing])) as [string];
  });

  it('D-45 serves pictures inline and everything else as a download, private and sandboxed', async () => {
    const photo = await expectStatus(read(`/api/files/${photoId}`), 200);
    expect(photo.headers).toMatchObject({
      'content-type': 'image/jpeg',
      'x-content-type-options': 'nosniff',
      'content-security-policy': "default-src 'none'; sandbox",
      'cache-control': 'private, no-cache',
      'cross-origin-resource-policy': 'same-origin',
    });
    expect(photo.headers['content-disposition']).toBe(
      `inline; filename="Wand ? Nord 1.jpg"; filename*=UTF-8''Wand%20%E2%80%93%20Nord%201.jpg`,
    );
    const drawing = await expectStatus(read(`/api/files/${drawingId}`), 200);
    expect(drawing.headers['content-type']).toBe('application/pdf');
    expect(drawing.headers['content-disposition']).toBe('attachment; filename=A-101.pdf');
    expect((await read(`/api/files/${drawingId}?size=thumb`)).status).toBe(404);
  });

  it('answers 304 to who has the same bytes already', async () => {
    const first = await read(`/api/files/${photoId}?size=thumb`);
    const etag = first.headers.etag as string;
    const again = await gc.owner.client.get(`/api/files/${photoId}?size=thumb`, {
      headers: { 'If-None-Match': etag },
    });
    expect(again.status).toBe(304);
    const foreign = await crew.owner.client.get(`/api/files/${photoId}?size=thumb`, {
      headers: { 'If-None-Match': etag },
    });
    expect(foreign.status).toBe(404);
  });

  it('D-45 another company’s file and no file answer the same', async () => {
    const foreign = await expectStatus(read(`/api/files/${photoId}`, crew.owner), 404);
    const missing = await expectStatus(read(`/api/files/${randomUUID()}`, crew.owner), 404);
    const bare = ({ error }: { error: { requestId?: string } }) => ({ ...error, requestId: '' });
    expect(bare(foreign.body)).toEqual(bare(missing.body));
    await expectStatus(read('/api/files/..%2F..%2Fetc%2Fpasswd'), 404);
    await expectStatus(read(`/api/files/${photoId}?size=raw`), 422);
    const signedOut = gc.owner.client.tab();
    signedOut.cookies.clear();
    await expectStatus(signedOut.get(`/api/files/${photoId}`), 401);
  });

  it('D-47 stores under the hash alone, readable to nobody else, and the same bytes once', async () => {
    const bytes = await fileBytes(gc.owner.client, photoId);
    const hash = sha256(bytes);
    const path = join(process.env.TEST_FILES_DIR ?? '', hash.slice(0, 2), hash.slice(2, 4), hash);
    expect(statSync(path).mode & 0o077).toBe(0);
    const inode = statSync(path).ino;
    await uploadFiles(crew.owner, 'photo', [await jpegPhoto('same.jpg', 5)]);
    expect(statSync(path).ino).toBe(inode);
  });
});

/** Resident memory of the app under test, found by the port it listens at. */
function appMemoryKb(): number {
  const port = Number(new URL(baseUrl()).port).toString(16).toUpperCase().padStart(4, '0');
  const script = `
    inode=$(awk -v p=":${port}" '$2 ~ p"$" && $4 == "0A" {print $10; exit}' /proc/net/tcp)
    for fd in /proc/[0-9]*/fd/*; do
      if [ "$(readlink $fd 2>/dev/null)" = "socket:[$inode]" ]; then
        pid=$(echo $fd | cut -d/ -f3); awk '/VmRSS/ {print $2}' /proc/$pid/status; exit
      fi
    done`;
  return Number(execFileSync('bash', ['-c', script], { encoding: 'utf8' }).trim());
}

/** A multipart request written by hand; the answer's text. */
function raw(headers: Record<string, string>, body: string, { breakOffAfterMs = 0 } = {}): Promise<string> {
  const url = new URL(baseUrl());
  const head = {
    Host: url.host,
    Origin: url.origin,
    Cookie: gc.owner.client.cookieHeader,
    'X-Kerfyard': '1',
    'Idempotency-Key': randomUUID(),
    'Content-Type': 'multipart/form-data; boundary=x',
    ...headers,
  };
  const lines = Object.entries(head).map(([name, value]) => `${name}: ${value}`);
  return new Promise((resolve) => {
    let answer = '';
    const socket = connect(Number(url.port), url.hostname, () => {
      socket.write(`POST /api/files HTTP/1.1\r\n${lines.join('\r\n')}\r\n\r\n${body}`);
      if (breakOffAfterMs > 0) setTimeout(() => socket.destroy(), breakOffAfterMs);
    });
    socket.on('data', (chunk) => {
      answer += chunk.toString('latin1');
      if (answer.includes('\r\n\r\n')) socket.end();
    });
    socket.on('error', () => undefined);
    socket.on('close', () => resolve(answer));
  });
}

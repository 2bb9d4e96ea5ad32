import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { createHash, randomUUID } from 'node:crypto';
import { constants } from 'node:fs';
import { mkdir, open, readdir, rename, rm, stat, type FileHandle } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import type { Readable } from 'node:stream';
import { Clock } from '../clock/clock.ts';
import { CONFIG, type Config } from '../config/config.ts';
import { storageKey } from './storage-key.ts';

const INCOMING = 'incoming';
const STALE_MS = 60 * 60 * 1000;

/**
 * Bytes on disk, written once under their SHA-256. Who may read them is not decided here. Nothing a person typed is
 * ever part of a path, and symbolic links are not followed.
 */
@Injectable()
export class Storage implements OnModuleInit {
  private readonly root: string;

  constructor(
    @Inject(CONFIG) config: Config,
    private readonly clock: Clock,
  ) {
    this.root = config.filesDir;
  }

  async onModuleInit(): Promise<void> {
    await mkdir(join(this.root, INCOMING), { recursive: true, mode: 0o700 });
    await this.removeStaleIncoming();
  }

  /** Keep bytes for good. The same bytes twice are one file. They are on the disk itself when this resolves. */
  async put(bytes: Buffer): Promise<{ sha256: string }> {
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const target = join(this.root, storageKey(sha256));
    if (await this.has(sha256, bytes.length)) return { sha256 };
    await mkdir(dirname(target), { recursive: true, mode: 0o700 });
    const temporary = this.incomingPath();
    const handle = await open(temporary, 'wx', 0o400);
    try {
      await handle.writeFile(bytes);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await rename(temporary, target);
    await syncFolder(dirname(target));
    return { sha256 };
  }

  /** @throws Error (ENOENT) when nothing lies under this hash */
  async read(sha256: string): Promise<Buffer> {
    const handle = await this.open(sha256);
    try {
      return await handle.readFile();
    } finally {
      await handle.close();
    }
  }

  /** The bytes as a stream with their length; the file closes with the stream. */
  async stream(sha256: string): Promise<{ stream: Readable; bytes: number }> {
    const handle = await this.open(sha256);
    const { size } = await handle.stat();
    return { stream: handle.createReadStream(), bytes: size };
  }

  /** A path of our own making for bytes still coming in; the caller removes it. */
  incomingPath(): string {
    return join(this.root, INCOMING, randomUUID());
  }

  private open(sha256: string): Promise<FileHandle> {
    return open(join(this.root, storageKey(sha256)), constants.O_RDONLY | constants.O_NOFOLLOW);
  }

  private async has(sha256: string, bytes: number): Promise<boolean> {
    try {
      const handle = await this.open(sha256);
      try {
        return (await handle.stat()).size === bytes;
      } finally {
        await handle.close();
      }
    } catch {
      return false;
    }
  }

  /** What a killed server left half-received. Another server may be receiving now, so only old ones go. */
  private async removeStaleIncoming(): Promise<void> {
    const folder = join(this.root, INCOMING);
    for (const name of await readdir(folder)) {
      const path = join(folder, name);
      const found = await stat(path).catch(() => null);
      if (found !== null && this.clock.wallMs() - found.mtimeMs > STALE_MS) await rm(path, { force: true });
    }
  }
}

/** A rename outlives a power cut only when its folder is synced as well. */
async function syncFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

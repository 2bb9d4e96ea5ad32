import { readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';

interface Chunk {
  file: string;
  css?: string[];
  imports?: string[];
}
type Manifest = Record<string, Chunk>;

const SESSION = '</api/auth/me>; rel=preload; as=fetch; crossorigin';

/**
 * What a page will ask for next, told with the page itself (RFC 8288 links), so that a phone's slow line fetches it all
 * at once: the code, styles and words of the page by the name its address begins with, and who is signed in.
 */
export class PageHints {
  private manifest: Manifest = {};
  private readAtMs = 0;
  private readonly file: string;

  constructor(clientDist: string) {
    this.file = join(clientDist, '.vite', 'manifest.json');
  }

  /** The value of the Link header for a page's address; empty when nothing is known of it. */
  linksFor(path: string, isSignedIn: boolean): string {
    const manifest = this.read();
    const name = /^\/([a-z-]+)/.exec(path)?.[1];
    const wanted = [`src/routes/${name}-page.tsx`, `src/locales/en/${name}.json`];
    const hints = [...new Set(wanted.flatMap((key) => [...filesOf(manifest, key)]))].map((file) =>
      // Style sheets are asked for with crossorigin by the page; without it here they would be fetched twice.
      file.endsWith('.css')
        ? `</${file}>; rel=preload; as=style; crossorigin`
        : `</${file}>; rel=modulepreload`,
    );
    return [...hints, ...(isSignedIn ? [SESSION] : [])].join(', ');
  }

  /** Read again after a build; a client without a manifest gives no hints. */
  private read(): Manifest {
    try {
      const { mtimeMs } = statSync(this.file);
      if (mtimeMs === this.readAtMs) return this.manifest;
      this.manifest = JSON.parse(readFileSync(this.file, 'utf8')) as Manifest;
      this.readAtMs = mtimeMs;
    } catch {
      this.manifest = {};
    }
    return this.manifest;
  }
}

/** The files a chunk needs before it runs: its own and those of what it imports at once. */
function filesOf(manifest: Manifest, key: string, files = new Set<string>()): Set<string> {
  const chunk = manifest[key];
  if (chunk === undefined || files.has(chunk.file)) return files;
  files.add(chunk.file);
  for (const css of chunk.css ?? []) files.add(css);
  for (const name of chunk.imports ?? []) filesOf(manifest, name, files);
  return files;
}

import { Worker } from 'node:worker_threads';
import { fileLimits } from '@kerfyard/common/files';
import { refusalWords } from './files.words.en.ts';
import type { PdfVerdict } from './pdf-inspection.ts';
import { Refusal } from './refusal.ts';

const SECONDS = 20;
const MEGABYTES = 256;

/**
 * Check a drawing in a worker of its own, which is stopped when it takes too much time or memory.
 * @returns its number of pages
 * @throws Refusal for damaged, encrypted, too long and active PDFs
 */
export async function preparePdf(bytes: Buffer): Promise<{ pages: number }> {
  const verdict = await inspectInWorker(bytes);
  if (verdict.ok) return { pages: verdict.pages };
  switch (verdict.because) {
    case 'damaged':
      throw new Refusal('unreadable', refusalWords.pdf);
    case 'encrypted':
      throw new Refusal('unreadable', refusalWords.encrypted);
    case 'active':
      throw new Refusal('wrong_type', refusalWords.active);
    case 'pages':
      throw new Refusal('too_large', refusalWords.pages);
  }
}

function inspectInWorker(bytes: Buffer): Promise<PdfVerdict> {
  const damaged: PdfVerdict = { ok: false, because: 'damaged' };
  return new Promise((resolve) => {
    // Compiled name: the rewriting of import paths does not reach a URL.
    const worker = new Worker(new URL('./pdf-inspection.worker.js', import.meta.url), {
      workerData: { bytes: new Uint8Array(bytes), maxPages: fileLimits.maxPdfPages },
      resourceLimits: { maxOldGenerationSizeMb: MEGABYTES },
    });
    const finish = (verdict: PdfVerdict) => {
      clearTimeout(deadline);
      void worker.terminate();
      resolve(verdict);
    };
    const deadline = setTimeout(() => finish(damaged), SECONDS * 1000);
    worker.once('message', finish);
    worker.once('error', () => finish(damaged));
    worker.once('exit', () => finish(damaged));
  });
}

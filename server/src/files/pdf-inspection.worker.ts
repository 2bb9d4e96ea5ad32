import { parentPort, workerData } from 'node:worker_threads';
import { inspectPdf } from './pdf-inspection.ts';

const { bytes, maxPages } = workerData as { bytes: Uint8Array; maxPages: number };
// The parser tells the console of each oddity, which here is only noise in the server's log.
console.warn = () => undefined;
parentPort?.postMessage(await inspectPdf(bytes, maxPages));

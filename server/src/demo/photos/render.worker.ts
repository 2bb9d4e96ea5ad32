import { parentPort, workerData } from 'node:worker_threads';
import { render } from './render.ts';
import { demoScenes, type DemoPhotoName } from './scenes.ts';

const { name, width, height } = workerData as { name: DemoPhotoName; width: number; height: number };
const pixels = render(demoScenes[name](), width, height);
parentPort?.postMessage(pixels);

// Runs one bench in a process of its own, so that none warms up or burdens another. Argument: the bench's file.
import { pathToFileURL } from 'node:url';

const { default: bench } = await import(pathToFileURL(process.argv[2]).href);
process.send(await bench());
process.disconnect();

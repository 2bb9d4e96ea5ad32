import { existsSync } from 'node:fs';
import { installPackage } from './apt.mjs';
import { Failure } from './failure.mjs';

const debianBrowsers = ['/usr/bin/chromium', '/usr/bin/chromium-headless-shell'];

/** Makes sure there is a Chromium for the browser tests: CHROMIUM, or Debian's, installed when we are root. */
export async function ensureChromium() {
  const wanted = process.env.CHROMIUM;
  if (wanted) {
    if (!existsSync(wanted)) throw new Failure(`CHROMIUM=${wanted} does not exist.`);
    return;
  }
  if (!debianBrowsers.some((path) => existsSync(path))) await installPackage('chromium', 'Chromium');
}

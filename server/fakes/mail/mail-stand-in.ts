import type { AddressInfo, Server as NetServer } from 'node:net';
import { bindAddress, closeServer, listen } from '../shared/http.ts';
import { MailStore } from './mail-store.ts';
import { createSmtpServer } from './smtp.ts';
import { createMailWeb } from './web.ts';

export interface MailStandInOptions {
  host: string;
  /** 0 takes a free port. */
  smtpPort: number;
  webPort: number;
  dataDir: string;
}

export interface MailStandIn {
  smtpPort: number;
  webUrl: string;
  close(): Promise<void>;
}

/** Starts both servers; rejects when a port is taken, with nothing left running. */
export async function startMailStandIn(options: MailStandInOptions): Promise<MailStandIn> {
  const store = new MailStore(options.dataDir);
  const web = createMailWeb(store);
  const webPort = await listen(web, options.webPort, options.host);
  const smtp = createSmtpServer(store);
  try {
    await new Promise<void>((resolve, reject) => {
      smtp.once('error', reject);
      smtp.listen(options.smtpPort, bindAddress(options.host), () => {
        smtp.off('error', reject);
        resolve();
      });
    });
  } catch (error) {
    await closeServer(web);
    throw error;
  }
  // A sender that hangs up in the middle is no reason to stop.
  smtp.on('error', () => undefined);
  return {
    smtpPort: ((smtp.server as NetServer).address() as AddressInfo).port,
    webUrl: `http://${options.host}:${webPort}`,
    async close() {
      await Promise.all([new Promise<void>((resolve) => smtp.close(() => resolve())), closeServer(web)]);
    },
  };
}

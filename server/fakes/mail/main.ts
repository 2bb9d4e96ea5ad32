import { portFrom, stopOnSignal } from '../shared/process.ts';
import { startMailStandIn } from './mail-stand-in.ts';

const host = process.env['HOST'] || 'localhost';
const standIn = await startMailStandIn({
  host,
  smtpPort: portFrom('MAIL_SMTP_PORT', 2525),
  webPort: portFrom('MAIL_WEB_PORT', 8025),
  dataDir: process.env['MAIL_DATA_DIR'] || '.data/mail',
}).catch((error: Error) => {
  console.error(`mail stand-in: ${error.message}`);
  process.exit(1);
});
stopOnSignal(() => standIn.close());
console.log(`mail stand-in ready: smtp on ${host}:${standIn.smtpPort}, read it at ${standIn.webUrl}`);

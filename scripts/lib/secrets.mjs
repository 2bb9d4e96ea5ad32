import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { Failure } from './failure.mjs';

const token = (bytes = 24) => randomBytes(bytes).toString('hex');

function freshSecrets() {
  return {
    signingSecret: token(32),
    superPassword: token(),
    ownerPassword: token(),
    appPassword: token(),
    // Shapes of the provider's test keys and signing secrets; they open nothing but the local stand-in.
    stripeSecretKey: `sk_test_${token()}`,
    accountWebhookSecret: `whsec_${token()}`,
    connectWebhookSecret: `whsec_${token()}`,
  };
}

/**
 * The keys of one data folder, made at its first use: `keys/secrets.json` (passwords and signing secrets) and
 * `keys/master.key` (32 random bytes as base64, for sealed bids), both readable by their owner only. Neither lies in
 * the database or among the uploaded files, so a copy of those opens no sealed bid.
 *
 * A database whose keys are gone is refused rather than given new ones: that would make its sealed bids unreadable.
 */
export function openSecrets(places, { clusterExists = false } = {}) {
  mkdirSync(places.keys, { recursive: true, mode: 0o700 });
  const missing = [places.secretsFile, places.masterKeyFile].filter((file) => !existsSync(file));
  if (clusterExists && missing.length > 0) {
    throw new Failure(
      `The database in ${places.clusterHome} is there but its key is not: ${missing.join(', ')}.\n` +
        'Put the file back, or start over with an empty demo: npm run reset',
    );
  }
  if (missing.includes(places.secretsFile))
    writeWhole(places.secretsFile, JSON.stringify(freshSecrets(), null, 2));
  if (missing.includes(places.masterKeyFile))
    writeWhole(places.masterKeyFile, randomBytes(32).toString('base64'));
  return JSON.parse(readFileSync(places.secretsFile, 'utf8'));
}

/** A kill while writing leaves no half file under the final name. */
function writeWhole(file, text) {
  writeFileSync(`${file}.new`, `${text}\n`, { mode: 0o600 });
  renameSync(`${file}.new`, file);
}

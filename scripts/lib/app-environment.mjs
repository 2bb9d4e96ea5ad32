/**
 * What a service inherits: the person's environment without what would lead PostgreSQL's client elsewhere and without
 * npm's own variables.
 */
export function inheritedEnvironment() {
  const kept = Object.entries(process.env).filter(
    ([name]) => !/^(PG[A-Z]+|npm_.*|NODE_CHANNEL_.*)$/.test(name),
  );
  return Object.fromEntries(kept);
}

/** What each mode of the server wants Node's libraries to assume. */
const nodeEnvironments = {
  demo: 'production',
  production: 'production',
  development: 'development',
  test: 'test',
};

/**
 * The server's whole environment. `appUrl` is where browsers find the app (in development the client's own server),
 * `ports`: app, stripe, mailWeb, smtp. `urls`: the cluster's. `places`: the data folder's.
 */
export function serverEnvironment({
  mode,
  ports,
  appUrl,
  urls,
  secrets,
  places,
  clientDist,
  rateLimitFactor = 1,
}) {
  return {
    ...inheritedEnvironment(),
    NODE_ENV: nodeEnvironments[mode],
    KERFYARD_MODE: mode,
    HOST: '127.0.0.1',
    PORT: String(ports.app),
    APP_URL: appUrl,
    CLIENT_DIST: clientDist,
    DATABASE_URL: urls.app,
    KERFYARD_MASTER_KEY_FILE: places.masterKeyFile,
    KERFYARD_SIGNING_SECRET: secrets.signingSecret,
    FILES_DIR: places.files,
    STRIPE_SECRET_KEY: secrets.stripeSecretKey,
    STRIPE_API_URL: stripeUrl(ports),
    STRIPE_PAGE_URL: stripeUrl(ports),
    STRIPE_WEBHOOK_SECRET: secrets.accountWebhookSecret,
    STRIPE_CONNECT_WEBHOOK_SECRET: secrets.connectWebhookSecret,
    SMTP_URL: `smtp://localhost:${ports.smtp}`,
    MAIL_FROM: 'Kerfyard <no-reply@kerfyard.example>',
    DEMO_SIGN_INS_FILE: places.signInsFile,
    LOG_LEVEL: process.env.LOG_LEVEL ?? 'info',
    RATE_LIMIT_FACTOR: String(rateLimitFactor),
  };
}

/** The same with the schema's owner: for migrations and nothing else. */
export const migrationEnvironment = (environment, urls) => ({
  ...environment,
  DATABASE_OWNER_URL: urls.owner,
});

/** The stand-in for the payment provider. It listens as `localhost`, so it shares no cookies with the app. */
export function stripeEnvironment({ ports, secrets, places }) {
  const webhook = (path, secret, connect) => ({
    url: `http://127.0.0.1:${ports.app}/api/payments/webhooks/${path}`,
    secret,
    connect,
  });
  return {
    ...inheritedEnvironment(),
    FAKE_STRIPE_HOST: 'localhost',
    FAKE_STRIPE_PORT: String(ports.stripe),
    FAKE_STRIPE_DATA_DIR: places.stripe,
    FAKE_STRIPE_SECRET_KEY: secrets.stripeSecretKey,
    FAKE_STRIPE_WEBHOOKS: JSON.stringify([
      webhook('account', secrets.accountWebhookSecret, false),
      webhook('connect', secrets.connectWebhookSecret, true),
    ]),
  };
}

/** The stand-in for the mail server: takes everything, delivers nothing, shows it on a page. */
export function mailEnvironment({ ports, places }) {
  return {
    ...inheritedEnvironment(),
    HOST: 'localhost',
    MAIL_SMTP_PORT: String(ports.smtp),
    MAIL_WEB_PORT: String(ports.mailWeb),
    MAIL_DATA_DIR: places.mail,
  };
}

export const appUrl = (ports) => `http://127.0.0.1:${ports.app}`;
export const stripeUrl = (ports) => `http://localhost:${ports.stripe}`;
export const mailUrl = (ports) => `http://localhost:${ports.mailWeb}`;

import { join } from 'node:path';

/** Where the local fakes keep what they are given. @param {string} folder the data folder */
export const fakeFolders = (folder) => ({
  objects: join(folder, 'objects'),
  mail: join(folder, 'mail'),
  cards: join(folder, 'cards'),
});

/**
 * Settings of the surroundings must not leak into local mode: only what a process needs to run passes.
 * @returns {NodeJS.ProcessEnv}
 */
function surroundings() {
  const passed = [
    'PATH',
    'HOME',
    'USER',
    'LANG',
    'LC_ALL',
    'TZ',
    'TMPDIR',
    'LOG_LEVEL',
    'NODE_EXTRA_CA_CERTS',
  ];
  return Object.fromEntries(
    passed.filter((name) => process.env[name] !== undefined).map((name) => [name, process.env[name]]),
  );
}

/**
 * Settings of the API, the worker, migrations and the demo in local mode.
 * @param {object} local
 * @param {import('./local-state.mjs').LocalState} local.state
 * @param {number} local.port
 * @param {string} local.databaseUrl
 * @param {string} [local.publicUrl] where the browser goes; the API's own address by default
 * @param {string} [local.editorFiles] another build of the editor than the product's own
 * @returns {NodeJS.ProcessEnv}
 */
export function productEnvironment({ state, port, databaseUrl, publicUrl, editorFiles }) {
  return {
    ...surroundings(),
    LAMPWRIGHT_MODE: 'local',
    HOST: '127.0.0.1',
    PORT: String(port),
    PUBLIC_URL: publicUrl ?? `http://127.0.0.1:${port}`,
    DATABASE_URL: databaseUrl,
    SESSION_SECRET: state.sessionSecret,
    S3_ENDPOINT: `http://127.0.0.1:${state.ports.storage}`,
    S3_REGION: 'us-east-1',
    S3_BUCKET: 'lampwright',
    S3_ACCESS_KEY_ID: state.storageKeyId,
    S3_SECRET_ACCESS_KEY: state.storageSecret,
    SMTP_URL: `smtp://127.0.0.1:${state.ports.smtp}`,
    MAIL_FROM: 'Lampwright <lampwright@localhost>',
    MAIL_VIEWER_URL: `http://127.0.0.1:${state.ports.mailViewer}`,
    STRIPE_SECRET_KEY: state.cardsSecretKey,
    STRIPE_WEBHOOK_SECRET: state.cardsWebhookSecret,
    STRIPE_API_BASE: `http://127.0.0.1:${state.ports.cards}`,
    ...(editorFiles === undefined ? {} : { EDITOR_FILES: editorFiles }),
  };
}

/**
 * Settings of the local fakes of object storage, mail and the card service.
 * @param {string} folder the data folder
 * @param {import('./local-state.mjs').LocalState} state
 * @param {number} port of the API, which the card service reports to
 * @returns {NodeJS.ProcessEnv}
 */
export function fakesEnvironment(folder, state, port) {
  const { objects, mail, cards } = fakeFolders(folder);
  return {
    ...surroundings(),
    FAKE_S3_PORT: String(state.ports.storage),
    FAKE_S3_DIR: objects,
    FAKE_SMTP_PORT: String(state.ports.smtp),
    FAKE_MAIL_HTTP_PORT: String(state.ports.mailViewer),
    FAKE_MAIL_DIR: mail,
    FAKE_CARDS_PORT: String(state.ports.cards),
    FAKE_CARDS_FILE: join(cards, 'state.json'),
    FAKE_CARDS_WEBHOOK_URL: `http://127.0.0.1:${port}/api/webhooks/stripe`,
    STRIPE_SECRET_KEY: state.cardsSecretKey,
    STRIPE_WEBHOOK_SECRET: state.cardsWebhookSecret,
    // The fake takes only requests signed with this installation's own key.
    S3_BUCKET: 'lampwright',
    S3_ACCESS_KEY_ID: state.storageKeyId,
    S3_SECRET_ACCESS_KEY: state.storageSecret,
  };
}

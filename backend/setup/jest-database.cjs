'use strict';
const fs = require('node:fs');
const os = require('node:os');
const path = require('node:path');

/**
 * Jest's global set-up for backend and jobs: tells the workers which throw-away PostgreSQL to use. `npm test`
 * names it in the environment; for a single file, `node backend/setup/dev-cluster.mjs` leaves a note.
 * Without either, unit tests still run, and the database helper of the integration tests says what is missing.
 */
module.exports = async function findTestDatabase() {
  if (process.env.TEST_DATABASE_ADMIN_URL) return;
  const note = path.join(os.tmpdir(), 'stayledger-dev-cluster.json');
  if (!fs.existsSync(note)) return;
  process.env.TEST_DATABASE_ADMIN_URL = JSON.parse(fs.readFileSync(note, 'utf8')).adminUrl;
};

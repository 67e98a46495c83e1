'use strict';

/** @type {import('jest').Config} */
module.exports = {
  ...require('../backend/setup/jest-settings.cjs'),
  rootDir: __dirname,
  displayName: 'jobs',
};

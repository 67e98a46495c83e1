'use strict';

/** @type {import('jest').Config} */
module.exports = { ...require('./setup/jest-settings.cjs'), rootDir: __dirname, displayName: 'backend' };

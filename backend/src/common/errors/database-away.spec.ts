import { DriverException } from '@mikro-orm/core';
import { databaseIsAway } from './database-away.js';

function coded(code: string): Error {
  return Object.assign(new Error('in the words of the server'), { code });
}

describe('databaseIsAway', () => {
  // SQLSTATE codes as in appendix A of PostgreSQL's manual.
  it.each(['08006', '53300', '57P01', '57P02', '57P03', 'ECONNREFUSED', 'ECONNRESET'])('knows %s', (code) => {
    expect(databaseIsAway(coded(code))).toBe(true);
  });

  it.each([
    'Connection terminated unexpectedly',
    'Connection terminated',
    'Client has encountered a connection error and is not queryable',
    'timeout exceeded when trying to connect',
  ])('knows what the driver says without a code, also behind a statement: %s', (words) => {
    expect(databaseIsAway(new Error(words))).toBe(true);
    expect(databaseIsAway(new DriverException(new Error(`select 1 - ${words}`)))).toBe(true);
  });

  it.each([coded('23505'), coded('42P01'), new Error('select 1 - division by zero'), 'text', null])(
    'takes nothing else for it',
    (error) => {
      expect(databaseIsAway(error)).toBe(false);
    },
  );
});

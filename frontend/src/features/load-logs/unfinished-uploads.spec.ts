import { describe, expect, it } from 'vitest';
import { findUnfinishedUpload, forgetUpload, rememberUpload, unfinishedUploadOf } from './unfinished-uploads';

function memoryStore(initial?: string) {
  const values = new Map<string, string>(
    initial === undefined ? [] : [['stayledger.unfinished-uploads', initial]],
  );
  return {
    getItem: (key: string) => values.get(key) ?? null,
    setItem: (key: string, value: string) => void values.set(key, value),
  };
}

const file = { fileName: 'june.csv', sizeBytes: 1000, headSha256: 'ab' };
const upload = { ...file, loadLogId: 'log-1', vesselId: 'vessel-1' };

describe('unfinished uploads', () => {
  it('finds the upload of the same file to the same vessel', () => {
    const store = memoryStore();
    rememberUpload(upload, store);
    expect(findUnfinishedUpload('vessel-1', file, store)?.loadLogId).toBe('log-1');
    expect(unfinishedUploadOf('log-1', store)?.fileName).toBe('june.csv');
  });

  it.each([
    ['another vessel', 'vessel-2', file],
    ['another size', 'vessel-1', { ...file, sizeBytes: 1001 }],
    ['another beginning', 'vessel-1', { ...file, headSha256: 'cd' }],
    ['another name', 'vessel-1', { ...file, fileName: 'july.csv' }],
  ])('does not take %s for it', (_, vesselId, fingerprint) => {
    const store = memoryStore();
    rememberUpload(upload, store);
    expect(findUnfinishedUpload(vesselId, fingerprint, store)).toBeNull();
  });

  it('forgets a finished one and keeps the others', () => {
    const store = memoryStore();
    rememberUpload(upload, store);
    rememberUpload({ ...upload, loadLogId: 'log-2', fileName: 'july.csv' }, store);
    forgetUpload('log-1', store);
    expect(unfinishedUploadOf('log-1', store)).toBeNull();
    expect(unfinishedUploadOf('log-2', store)?.fileName).toBe('july.csv');
  });

  it('passes over entries that are not whole', () => {
    const store = memoryStore(JSON.stringify([{ loadLogId: 'log-1', vesselId: 'vessel-1' }, null, upload]));
    expect(findUnfinishedUpload('vessel-1', file, store)?.loadLogId).toBe('log-1');
    forgetUpload('log-1', store);
    expect(unfinishedUploadOf('log-1', store)).toBeNull();
  });

  it('starts afresh when what is stored makes no sense, and does without a store', () => {
    const store = memoryStore('{"not": "a list"');
    expect(findUnfinishedUpload('vessel-1', file, store)).toBeNull();
    rememberUpload(upload, store);
    expect(findUnfinishedUpload('vessel-1', file, store)?.loadLogId).toBe('log-1');
    expect(findUnfinishedUpload('vessel-1', file, null)).toBeNull();
  });
});

import { useSyncExternalStore } from 'react';
import { uploadManager, type UploadProgress } from './upload-manager';

/** The upload of a log by this tab, or null when this tab does not send it. */
export function useUploadProgress(loadLogId: string): UploadProgress | null {
  return useSyncExternalStore(uploadManager.subscribe, () => uploadManager.progressOf(loadLogId));
}

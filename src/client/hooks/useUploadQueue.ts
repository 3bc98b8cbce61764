import { useEffect, useState, useSyncExternalStore } from 'react';
import { v7 as createUuid } from 'uuid';
import { uploadRecording } from '#client/api/uploadRecording.ts';
import { isUnfinished, type Upload } from '#client/uploads/upload.ts';
import { refusalBeforeSending } from '#client/uploads/refusalBeforeSending.ts';
import { UploadQueue } from '#client/uploads/uploadQueue.ts';

const NO_UPLOADS: readonly Upload[] = [];

export interface UploadQueueView {
  readonly uploads: readonly Upload[];
  readonly queue: UploadQueue;
}

/** The page's upload queue: goes on when the network is back and warns before a reload would lose a file. */
export function useUploadQueue(): UploadQueueView {
  const [queue] = useState(
    () => new UploadQueue({ send: uploadRecording, createKey: createUuid, refusalBeforeSending }),
  );
  const uploads = useSyncExternalStore(queue.subscribe, queue.snapshot, () => NO_UPLOADS);
  const hasUnfinished = uploads.some(isUnfinished);

  useEffect(() => {
    const resume = () => {
      queue.resume();
    };
    window.addEventListener('online', resume);
    return () => {
      window.removeEventListener('online', resume);
    };
  }, [queue]);

  useEffect(() => {
    if (!hasUnfinished) return undefined;
    const warn = (event: BeforeUnloadEvent) => {
      event.preventDefault();
    };
    window.addEventListener('beforeunload', warn);
    return () => {
      window.removeEventListener('beforeunload', warn);
    };
  }, [hasUnfinished]);

  return { uploads, queue };
}

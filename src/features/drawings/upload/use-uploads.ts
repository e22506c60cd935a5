import { useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useStore } from 'zustand';
import { drawingKeys } from '../api/drawing-queries.ts';
import { sendFile } from './send-file.ts';
import { createUploadQueue, isOnItsWay, type Upload } from './upload-queue.ts';

/** One queue for the whole tab. */
export const uploadQueue = createUploadQueue(sendFile);

// Leaving the site would break off what is on its way, so the browser asks first.
window.addEventListener('beforeunload', (event) => {
  if (uploadQueue.store.getState().uploads.some(isOnItsWay)) event.preventDefault();
});

/** The files on their way to one dam; the register is loaded again when one has arrived. */
export function useUploads(damId: string): Upload[] {
  const queryClient = useQueryClient();
  const uploads = useStore(uploadQueue.store, (state) => state.uploads);
  useEffect(
    () =>
      uploadQueue.onAdded(() => {
        void queryClient.invalidateQueries({ queryKey: drawingKeys.lists });
        void queryClient.invalidateQueries({ queryKey: ['dams'] });
      }),
    [queryClient],
  );
  return uploads.filter((upload) => upload.damId === damId);
}

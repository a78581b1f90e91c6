import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import type { AttachedFile } from '../../../../shared/schemas/files';
import { sayDone } from '../../../components/live-region-store';
import { problemSentences } from '../../../lib/forms';
import { uploadFile } from '../../../lib/upload';
import { attachFile } from './queries';

/** A file on its way to a plate, and why the last one did not come. */
interface PlateUpload {
  readonly sending: { readonly name: string; readonly share: number } | null;
  readonly fault: string | null;
  readonly send: (file: File) => void;
  readonly cancel: () => void;
}

/** What a file is kept as: a picture is a photo, everything else a data sheet. */
function kindOf(mediaType: AttachedFile['mediaType']): AttachedFile['kind'] {
  return mediaType.startsWith('image/') ? 'photo' : 'data-sheet';
}

/** Uploads a file and attaches it to a plate. Leaving the page stops it. */
export function usePlateUpload(labId: string, plateId: string): PlateUpload {
  const queryClient = useQueryClient();
  const [sending, setSending] = useState<PlateUpload['sending']>(null);
  const [fault, setFault] = useState<string | null>(null);
  const cancelling = useRef<AbortController | null>(null);
  useEffect(() => () => cancelling.current?.abort(), []);

  const send = async (file: File) => {
    const controller = new AbortController();
    cancelling.current = controller;
    setFault(null);
    setSending({ name: file.name, share: 0 });
    try {
      const stored = await uploadFile(labId, file, {
        signal: controller.signal,
        onProgress: (share) => setSending({ name: file.name, share }),
      });
      await attachFile(labId, plateId, { fileId: stored.id, kind: kindOf(stored.mediaType) });
      await queryClient.invalidateQueries({ queryKey: ['labs', labId, 'plates'] });
      sayDone(`${stored.name} is attached.`);
    } catch (error) {
      if (!controller.signal.aborted) setFault(problemSentences(error).join(' '));
    } finally {
      setSending(null);
    }
  };
  return {
    sending,
    fault,
    send: (file) => void send(file),
    cancel: () => cancelling.current?.abort(),
  };
}

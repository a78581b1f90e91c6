import { useRef, useState } from 'react';
import { MAX_SCAN_BYTES } from '../../../shared/scan-file';
import { uploadFile } from '../../lib/upload';

export interface ChosenFile {
  readonly file: File;
  readonly bytes: Uint8Array;
}

/** The file that is looked at: read here first, and stored once, when the scan is recorded. */
export function useScanFile(labId: string) {
  const [chosen, setChosen] = useState<ChosenFile | null>(null);
  const [fault, setFault] = useState<string | null>(null);
  const [sending, setSending] = useState<{ readonly name: string; readonly share: number } | null>(null);
  const cancelling = useRef<AbortController | null>(null);
  const stored = useRef<{ readonly file: File; readonly id: string } | null>(null);

  const choose = async (file: File): Promise<boolean> => {
    if (file.size === 0) setFault(`${file.name} is empty. Choose the file that the measurement wrote.`);
    else if (file.size > MAX_SCAN_BYTES) {
      setFault(
        `${file.name} has ${(file.size / 1024 / 1024).toFixed(1)} MB, and 10 MB is the most. Keep one scan a file.`,
      );
    } else {
      try {
        const bytes = new Uint8Array(await file.arrayBuffer());
        setFault(null);
        setChosen({ file, bytes });
        return true;
      } catch {
        setFault(`${file.name} can’t be read any more. Choose it again.`);
      }
    }
    return false;
  };

  /** The id of the stored file; sent once, however often recording is tried. */
  const store = async (file: File): Promise<string> => {
    if (stored.current?.file === file) return stored.current.id;
    const controller = new AbortController();
    cancelling.current = controller;
    setSending({ name: file.name, share: 0 });
    try {
      const { id } = await uploadFile(labId, file, {
        signal: controller.signal,
        onProgress: (share) => setSending({ name: file.name, share }),
      });
      stored.current = { file, id };
      return id;
    } finally {
      setSending(null);
    }
  };

  return { chosen, fault, sending, choose, store, cancel: () => cancelling.current?.abort() };
}

import { answerScan, type ScanReply, type ScanRequest } from './answer-scan';

self.addEventListener('message', ({ data }: MessageEvent<ScanRequest>) => {
  const reply = (): ScanReply => {
    try {
      return answerScan(data);
    } catch (error) {
      return { kind: 'failed', sentence: error instanceof Error ? error.message : 'The fit stopped.' };
    }
  };
  self.postMessage(reply());
});

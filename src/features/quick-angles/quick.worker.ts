import { quickSettings } from './quick-settings';
import type { QuickJob } from './use-quick-settings';

self.addEventListener('message', ({ data: { written, quick } }: MessageEvent<QuickJob>) => {
  self.postMessage(quickSettings(written, quick));
});

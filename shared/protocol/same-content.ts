import type { VersionContent } from '../schemas/versions';
import { canonicalJson } from './canonical-json';

/** Do two versions hold the same, whoever saved them, when, with what words and after what? */
export function sameContent(a: VersionContent, b: VersionContent): boolean {
  return withoutSaving(a) === withoutSaving(b);
}

function withoutSaving(content: VersionContent): string {
  return canonicalJson({
    ...content,
    number: null,
    parentHash: null,
    message: null,
    savedAt: null,
    savedBy: null,
  });
}

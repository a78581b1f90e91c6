import { z } from 'zod';
import { contentHash } from './canonical-json';

/** One link as it is stored: the text, and the two hashes that are kept beside it. */
interface ChainLink {
  readonly number: number;
  readonly canonicalJson: string;
  readonly contentHash: string;
  readonly parentHash: string | null;
}

type ChainVerdict =
  | { readonly ok: true; readonly length: number }
  | { readonly ok: false; readonly number: number; readonly reason: string };

const inside = z.object({ number: z.int(), parentHash: z.string().nullable() });

/** Re-hashes a protocol's versions, oldest first, and names the first that is not what it was when it was saved. */
export function verifyChain(links: readonly ChainLink[]): ChainVerdict {
  let parent: string | null = null;
  for (const [index, link] of links.entries()) {
    const bad = (reason: string) => ({ ok: false, number: link.number, reason }) as const;
    if (link.number !== index + 1) return bad(`version ${index + 1} is missing before it`);
    if (contentHash(link.canonicalJson) !== link.contentHash) return bad('its text does not match its hash');
    if (link.parentHash !== parent) return bad('it does not follow the version before it');
    const said = inside.safeParse(readJson(link.canonicalJson));
    if (!said.success || said.data.number !== link.number || said.data.parentHash !== parent) {
      return bad('its text names another number or parent than its row');
    }
    parent = link.contentHash;
  }
  return { ok: true, length: links.length };
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

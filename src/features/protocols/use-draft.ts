import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import {
  type Draft,
  type DraftContent,
  draftContentSchema,
  draftSchema,
  type Protocol,
} from '../../../shared/schemas/protocols';
import { ApiError } from '../../lib/api';
import { labQuery } from '../labs';
import type { DraftEdit } from './draft-edits';
import { applyEdit, type DraftHistory, redo, startHistory, undo } from './draft-history';
import { forgetDraft, keepDraft, keptDraft } from './kept-draft';
import { protocolQuery, protocolsQuery, saveDraft } from './queries';

/** How honest the page can be about what was typed. */
export type Saving =
  | { readonly state: 'saved'; readonly at: string; readonly by: string }
  | { readonly state: 'typed' }
  | { readonly state: 'kept'; readonly reason: string };

export interface DraftControl {
  readonly content: DraftContent;
  readonly revision: number;
  readonly saving: Saving;
  /** What somebody else has saved meanwhile; until the person decides nothing is overwritten. */
  readonly conflict: Draft | null;
  readonly edit: (edit: DraftEdit) => void;
  readonly undo: () => void;
  readonly redo: () => void;
  readonly takeTheirs: () => void;
  readonly keepMine: () => void;
}

interface State {
  readonly history: DraftHistory;
  /** What the server has. */
  readonly base: Draft;
  readonly conflict: Draft | null;
  readonly keptReason: string | null;
}

const quietMs = 600;
const retryMs = 5000;

function open(protocol: Protocol, userId: string): State {
  const { draft } = protocol;
  const kept = keptDraft(userId, protocol.id);
  const state: State = {
    history: startHistory(draft.content),
    base: draft,
    conflict: null,
    keptReason: null,
  };
  if (kept === null || same(kept.content, draft.content)) return state;
  const history = { ...startHistory(draft.content), content: kept.content, past: [draft.content] };
  return { ...state, history, conflict: kept.revision === draft.revision ? null : draft };
}

function same(one: DraftContent, other: DraftContent): boolean {
  return JSON.stringify(one) === JSON.stringify(other);
}

/** As the server will keep it: trimmed, for one, so that a space after a name is not a change for ever. */
function asKept(content: DraftContent): DraftContent | null {
  const parsed = draftContentSchema.safeParse(content);
  return parsed.success ? parsed.data : null;
}

/** Reading two hundred rows takes a while: what is the very same, as on a page just opened, is not read. */
function isUnsaved(content: DraftContent, saved: DraftContent): boolean {
  return content !== saved && !same(asKept(content) ?? content, saved);
}

/** A refusal is final until something else is typed; what is worth another try is a server or a network that failed. */
function mayPass(error: unknown): boolean {
  return !(error instanceof ApiError) || [0, 408, 429].includes(error.status) || error.status >= 500;
}

/** A draft under edit: saves itself a moment after the last key, keeps what could not be saved, and never overwrites somebody else's save. */
export function useDraft(labId: string, userId: string, protocol: Protocol, mayWrite: boolean): DraftControl {
  const queryClient = useQueryClient();
  const protocolId = protocol.id;
  const [state, setState] = useState(() => open(protocol, userId));
  const [attempt, setAttempt] = useState(0);
  const inFlight = useRef(false);
  const leaving = useRef<() => void>(() => undefined);
  const { history, base, conflict, keptReason } = state;
  const { content } = history;
  const unsaved = useMemo(() => isUnsaved(content, base.content), [content, base.content]);

  useEffect(() => {
    leaving.current = () => undefined;
    if (!mayWrite) return;
    if (!unsaved) {
      forgetDraft(userId, protocolId);
      return;
    }
    const kept = keepDraft(userId, protocolId, { revision: base.revision, content });
    const sent = asKept(content);
    if (conflict !== null || sent === null) return;
    const acknowledge = (saved: Draft) => {
      setState((now) => ({ ...now, base: saved, keptReason: null }));
      queryClient.setQueryData(protocolQuery(labId, protocolId).queryKey, (old: Protocol | undefined) =>
        old === undefined ? old : { ...old, draft: saved },
      );
      void queryClient.invalidateQueries({ queryKey: protocolsQuery(labId).queryKey, exact: true });
    };
    const save = async (keepalive: boolean) => {
      // One at a time: a second save of the same revision would meet the first as a stranger's.
      if (inFlight.current) return;
      inFlight.current = true;
      try {
        acknowledge(await saveDraft(labId, protocolId, sent, base.revision, keepalive));
      } catch (error) {
        const theirs = theirDraft(error);
        if (theirs !== null) {
          // Our own save whose answer was lost comes back as theirs.
          if (same(theirs.content, sent)) acknowledge(theirs);
          else setState((now) => ({ ...now, conflict: theirs }));
          // A changed convention raises every draft's revision, and the page has to know of it.
          void queryClient.invalidateQueries({ queryKey: labQuery(labId).queryKey, exact: true });
          return;
        }
        const reason = error instanceof Error ? error.message : 'It could not be saved.';
        setState((now) => ({ ...now, keptReason: kept ? reason : `${reason} This device keeps no copy.` }));
        if (mayPass(error)) setTimeout(() => setAttempt((count) => count + 1), retryMs);
      } finally {
        inFlight.current = false;
      }
    };
    let waiting = true;
    const timer = setTimeout(() => {
      waiting = false;
      void save(false);
    }, quietMs);
    const leave = () => void save(true);
    window.addEventListener('pagehide', leave);
    leaving.current = () => {
      if (waiting) void save(true);
    };
    return () => {
      clearTimeout(timer);
      window.removeEventListener('pagehide', leave);
    };
  }, [labId, userId, protocolId, content, unsaved, base.revision, conflict, attempt, mayWrite, queryClient]);

  // Another page of ours is no reason to leave the last keys behind.
  useEffect(() => () => leaving.current(), []);

  const change = useCallback(
    (next: (history: DraftHistory) => DraftHistory) =>
      setState((now) => ({ ...now, history: next(now.history) })),
    [],
  );

  return {
    content,
    revision: base.revision,
    saving: !unsaved
      ? { state: 'saved', at: base.savedAt, by: base.savedBy }
      : keptReason === null
        ? { state: 'typed' }
        : { state: 'kept', reason: keptReason },
    conflict,
    edit: (edit) => change((now) => applyEdit(now, edit)),
    undo: () => change(undo),
    redo: () => change(redo),
    takeTheirs: () =>
      setState((now) =>
        now.conflict === null
          ? now
          : {
              ...now,
              base: now.conflict,
              history: {
                content: now.conflict.content,
                past: [...now.history.past, now.history.content],
                future: [],
                typing: null,
              },
              conflict: null,
            },
      ),
    keepMine: () =>
      setState((now) => (now.conflict === null ? now : { ...now, base: now.conflict, conflict: null })),
  };
}

/** The other side of a conflict: the server sends it with its 412. */
function theirDraft(error: unknown): Draft | null {
  if (!(error instanceof ApiError) || error.status !== 412) return null;
  const theirs = draftSchema.safeParse(error.problem?.current);
  return theirs.success ? theirs.data : null;
}

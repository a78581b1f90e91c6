import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import {
  type Draft,
  draftContentSchema,
  draftSchema,
  type Protocol,
} from '../../../shared/schemas/protocols';
import { ApiError } from '../../lib/api';
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
  readonly content: DraftHistory['content'];
  readonly revision: number;
  readonly saving: Saving;
  /** What somebody else has saved meanwhile; until the person decides nothing is overwritten. */
  readonly conflict: Draft | null;
  readonly canUndo: boolean;
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
  if (kept === null || JSON.stringify(kept.content) === JSON.stringify(draft.content)) return state;
  const history = { ...startHistory(draft.content), content: kept.content, past: [draft.content] };
  return { ...state, history, conflict: kept.revision === draft.revision ? null : draft };
}

/** A draft under edit: saves itself a moment after the last key, keeps what could not be saved, and never overwrites somebody else's save. */
export function useDraft(labId: string, userId: string, protocol: Protocol, mayWrite: boolean): DraftControl {
  const queryClient = useQueryClient();
  const protocolId = protocol.id;
  const [state, setState] = useState(() => open(protocol, userId));
  const [attempt, setAttempt] = useState(0);
  const inFlight = useRef(false);
  const { history, base, conflict, keptReason } = state;
  const changed = JSON.stringify(history.content) !== JSON.stringify(base.content);

  useEffect(() => {
    if (!mayWrite) return;
    if (!changed) {
      forgetDraft(userId, protocolId);
      return;
    }
    const kept = keepDraft(userId, protocolId, { revision: base.revision, content: history.content });
    if (conflict !== null || !draftContentSchema.safeParse(history.content).success) return;
    const save = async () => {
      // One at a time: a second save of the same revision would meet the first as a stranger's.
      if (inFlight.current) return;
      inFlight.current = true;
      try {
        const saved = await saveDraft(labId, protocolId, history.content, base.revision);
        setState((now) => ({ ...now, base: saved, keptReason: null }));
        queryClient.setQueryData(protocolQuery(labId, protocolId).queryKey, (old: Protocol | undefined) =>
          old === undefined ? old : { ...old, draft: saved },
        );
        void queryClient.invalidateQueries({ queryKey: protocolsQuery(labId).queryKey, exact: true });
      } catch (error) {
        const theirs = theirDraft(error);
        if (theirs !== null) {
          setState((now) => ({ ...now, conflict: theirs }));
          return;
        }
        const reason = error instanceof Error ? error.message : 'It could not be saved.';
        setState((now) => ({ ...now, keptReason: kept ? reason : `${reason} This device keeps no copy.` }));
        setTimeout(() => setAttempt((count) => count + 1), retryMs);
      } finally {
        inFlight.current = false;
      }
    };
    const timer = setTimeout(() => void save(), quietMs);
    return () => clearTimeout(timer);
  }, [
    labId,
    userId,
    protocolId,
    history.content,
    base.revision,
    changed,
    conflict,
    attempt,
    mayWrite,
    queryClient,
  ]);

  const change = useCallback(
    (next: (history: DraftHistory) => DraftHistory) =>
      setState((now) => ({ ...now, history: next(now.history) })),
    [],
  );

  return {
    content: history.content,
    revision: base.revision,
    saving: !changed
      ? { state: 'saved', at: base.savedAt, by: base.savedBy }
      : keptReason === null
        ? { state: 'typed' }
        : { state: 'kept', reason: keptReason },
    conflict,
    canUndo: history.past.length > 0,
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

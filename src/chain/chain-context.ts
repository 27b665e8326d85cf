import { createContext, useContext } from 'react';
import type { Decision } from '../../shared/domain/decision.ts';
import type { StudyEvaluation } from '../../shared/engine/model/evaluation.ts';
import type { ChainDocument, ChainState, EditOutcome } from './editing/chain-document.ts';
import type { ItemEdit } from './editing/chain-edits.ts';

/** Text in a field that could not be taken yet; kept by field so that looking elsewhere loses nothing. */
export type HeldText = { readonly text: string; readonly uncertaintyText: string };

export type ChainContextValue = {
  readonly studyId: string;
  readonly title: string;
  readonly document: ChainDocument;
  readonly state: ChainState;
  /** Of the model on screen, saved or not. */
  readonly evaluation: StudyEvaluation;
  readonly selectedId: string | null;
  readonly select: (id: string | null) => void;
  /** Says it to screen readers and in the notice line. */
  readonly announce: (sentence: string) => void;
  readonly mayEdit: Decision;
  readonly newId: () => string;
  readonly held: Map<string, HeldText>;
};

const ChainContext = createContext<ChainContextValue | null>(null);
export const ChainProvider = ChainContext.Provider;

export function useChain(): ChainContextValue {
  const value = useContext(ChainContext);
  if (!value) throw new Error('useChain needs a ChainProvider around it.');
  return value;
}

/** Makes edits with the rights of the person; a refusal is announced and handed back for the place where it arose. */
export function useEdit(): (edits: readonly ItemEdit[], summary: string, key?: string) => EditOutcome {
  const { document, mayEdit, announce } = useChain();
  return (edits, summary, key) => {
    const outcome: EditOutcome = mayEdit.allowed
      ? document.edit(edits, summary, key ?? null)
      : { ok: false, sentence: mayEdit.reason };
    if (!outcome.ok) announce(outcome.sentence);
    return outcome;
  };
}

import * as z from 'zod';
import { chainEditSchema } from '../../../shared/api/studies.ts';
import { chainItemKinds } from '../../../shared/domain/audit-events.ts';
import type { Draft } from '../../chain/editing/document-ports.ts';

const draftSchema = z.object({
  edits: z.array(z.object({ kind: z.enum(chainItemKinds), id: z.string(), body: chainEditSchema.shape.body })),
  expected: z.record(z.string(), z.int()),
  summaries: z.array(z.string()),
  reasons: z.record(z.string(), z.string()),
});

/** By person: whoever signs in next in this tab must not save another's changes as their own. */
export type DraftOwner = { readonly personId: string; readonly studyId: string };

const keyOf = ({ personId, studyId }: DraftOwner) => `stemma-draft:${personId}:${studyId}`;

/** What was not saved when this tab last showed the study; null where nothing is left or it cannot be read. */
export function readDraft(owner: DraftOwner): Draft | null {
  try {
    const text = sessionStorage.getItem(keyOf(owner));
    return text === null ? null : draftSchema.parse(JSON.parse(text));
  } catch {
    return null;
  }
}

/** Keeps the draft over a reload of this tab; with the storage full or forbidden the draft lives in memory only. */
export function keepDraft(owner: DraftOwner, draft: Draft | null): void {
  try {
    if (draft === null) sessionStorage.removeItem(keyOf(owner));
    else sessionStorage.setItem(keyOf(owner), JSON.stringify(draft));
  } catch {
    // The guard against leaving still stands.
  }
}

import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState, useSyncExternalStore } from 'react';
import { editChain, type Study, saveLayout } from '../../../shared/api/studies.ts';
import { checkModel } from '../../../shared/engine/evaluate/check-model.ts';
import { call } from '../../api/call.ts';
import { useActor } from '../../api/session.ts';
import { ChainDocument, type ChainState } from '../../chain/editing/chain-document.ts';
import { keepDraft, readDraft } from './draft-storage.ts';
import { sent, studyQuery } from './study-queries.ts';

const pauseMs = { save: 800, layout: 600 } as const;

/** The study on screen as a document that saves itself; a newer answer from the server goes under its unsaved changes. */
export function useStudyDocument(study: Study): { readonly document: ChainDocument; readonly state: ChainState } {
  const queryClient = useQueryClient();
  const { personId } = useActor();
  const [document] = useState(() => {
    const timers = new Map<string, ReturnType<typeof setTimeout>>();
    const params = { studyId: study.id };
    const owner = { personId, studyId: study.id };
    return new ChainDocument(
      study,
      {
        send: (body) => sent(call(editChain, { params, query: undefined, body })),
        sendLayout: (layout) => sent(call(saveLayout, { params, query: undefined, body: { layout } })),
        later: (name, task) => {
          clearTimeout(timers.get(name));
          timers.set(name, setTimeout(task, pauseMs[name]));
        },
        now: () => new Date(),
        check: (model) => checkModel(model).map((error) => error.sentence),
        keepDraft: (draft) => keepDraft(owner, draft),
        onMoved: () => void queryClient.invalidateQueries({ queryKey: studyQuery(study.id).queryKey }),
      },
      readDraft(owner),
    );
  });
  const state = useSyncExternalStore(document.subscribe, document.getState);

  useEffect(() => document.receive(study), [document, study]);

  useEffect(() => {
    function warn(event: BeforeUnloadEvent): void {
      if (document.isDirty) event.preventDefault();
    }
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [document]);

  return { document, state };
}

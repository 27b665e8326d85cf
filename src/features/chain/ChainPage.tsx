import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useParams } from 'react-router-dom';
import type { Study } from '../../../shared/api/studies.ts';
import { abilityOf } from '../../../shared/domain/ability.ts';
import { canEdit } from '../../../shared/domain/study-policy.ts';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import { useActor } from '../../api/session.ts';
import { ChainProvider, type HeldText } from '../../chain/chain-context.ts';
import { Loading } from '../../ui/Loading.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { usePageTitle } from '../../ui/use-page-title.ts';
import { studyQuery } from './study-queries.ts';
import { useSelection } from './use-selection.ts';
import { useStudyDocument } from './use-study-document.ts';
import { Workbench } from './Workbench.tsx';

/** A study: its chain as canvas or outline, with the inspector beside it. */
export function Component() {
  const { studyId = '' } = useParams();
  const study = useQuery(studyQuery(studyId));
  if (study.data) return <OpenStudy key={study.data.id} study={study.data} />;
  if (study.error) return <ProblemNote error={study.error} onRetry={() => void study.refetch()} />;
  return <Loading what="the chain" />;
}

function OpenStudy({ study }: { readonly study: Study }) {
  usePageTitle(study.title);
  const actor = useActor();
  const { document, state } = useStudyDocument(study);
  const { selectedId, select } = useSelection();
  const [notice, setNotice] = useState<{ readonly text: string; readonly count: number } | null>(null);
  const [held] = useState(() => new Map<string, HeldText>());
  const evaluation = useMemo(() => evaluateStudy(state.model), [state.model]);
  const mayEdit = useMemo(() => canEdit({ ...actor, ability: abilityOf(actor) }, study.id), [actor, study.id]);
  const context = useMemo(
    () => ({
      studyId: study.id,
      title: study.title,
      document,
      state,
      evaluation,
      selectedId,
      select,
      // A counter, so that the same sentence twice is said twice.
      announce: (text: string) => setNotice((before) => ({ text, count: (before?.count ?? 0) + 1 })),
      mayEdit,
      newId: () => crypto.randomUUID(),
      held,
    }),
    [study.id, study.title, document, state, evaluation, selectedId, select, mayEdit, held],
  );
  return (
    <ChainProvider value={context}>
      <Workbench notice={notice} onDismissNotice={() => setNotice(null)} />
    </ChainProvider>
  );
}

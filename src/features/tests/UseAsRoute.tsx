import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { type ChainEdit, editChain, type Study } from '../../../shared/api/studies.ts';
import type { Test } from '../../../shared/engine/model/study-model.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { newQuantity, newTestResult } from '../../chain/editing/new-items.ts';
import { Button } from '../../ui/Button.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';

/** After the upload: the test becomes a route of a quantity h, new or one that the study has, and may give the velocity. */
export function UseAsRoute({ study, test }: { readonly study: Study; readonly test: Test }) {
  const navigate = useNavigate();
  const here = study.model.quantities.filter((quantity) => quantity.operatingPointId === test.operatingPointId);
  const point = study.model.operatingPoints.find((one) => one.id === test.operatingPointId);
  const [quantityId, setQuantityId] = useState('new');
  const [takesVelocity, setTakesVelocity] = useState(!point?.entries.some((entry) => entry.key === 'u'));

  const use = useMutation({
    mutationFn: async () => {
      const known = here.find((quantity) => quantity.id === quantityId);
      const id = known?.id ?? crypto.randomUUID();
      const route = newTestResult(crypto.randomUUID(), id, test);
      const quantity =
        known ??
        newQuantity(id, {
          symbol: 'h',
          name: `Heat-transfer coefficient, ${test.name}`,
          unit: 'W/(m² K)',
          operatingPointId: test.operatingPointId,
        });
      const edits: ChainEdit[] = [
        {
          kind: 'quantity',
          id,
          expectedRevision: known ? (study.itemRevisions[id] ?? 0) : 0,
          body: { ...quantity, adoptedRouteId: route.id },
        },
        { kind: 'route', id: route.id, expectedRevision: 0, body: route },
      ];
      if (takesVelocity && point) {
        const others = point.entries.filter((entry) => entry.key !== 'u');
        edits.push({
          kind: 'operating-point',
          id: point.id,
          expectedRevision: study.itemRevisions[point.id] ?? 0,
          body: { ...point, entries: [...others, { key: 'u', source: { from: 'test', testId: test.id } }] },
        });
      }
      const summary = `Took h of ${quantity.name} from the test ${test.name}`;
      await call(editChain, { params: { studyId: study.id }, query: undefined, body: { summary, reason: '', edits } });
      return id;
    },
    onSuccess: (id) => navigate(`${paths.study(study.id)}?selected=${id}`),
  });

  return (
    <div className="mx-auto grid w-full max-w-2xl gap-5 px-4 py-6">
      <h1 className="text-xl font-bold">{test.name} is in the study</h1>
      <p className="text-sm">
        The original file is kept with its SHA-256,{' '}
        <span className="num text-xs break-all whitespace-normal">{test.file.sha256}</span>.
      </p>
      <form
        className="grid gap-3 border-2 border-rule bg-surface p-4"
        onSubmit={(event) => {
          event.preventDefault();
          use.mutate();
        }}
      >
        <label className="grid gap-1 text-xs font-semibold">
          Use its result as h of
          <select
            className="min-h-9 border border-line bg-surface px-2 text-sm font-normal"
            value={quantityId}
            onChange={(event) => setQuantityId(event.target.value)}
          >
            <option value="new">a new quantity h at {point?.name}</option>
            {here.map((quantity) => (
              <option key={quantity.id} value={quantity.id}>
                {quantity.symbol}, {quantity.name}
              </option>
            ))}
          </select>
        </label>
        <label className="flex min-h-8 items-center gap-2 text-sm">
          <input type="checkbox" checked={takesVelocity} onChange={(event) => setTakesVelocity(event.target.checked)} />
          Take the velocity of {point?.name} from this test too
        </label>
        {use.error && <ProblemNote error={use.error} />}
        <span className="flex flex-wrap items-center gap-4">
          <Button type="submit" disabled={use.isPending}>
            Use as h
          </Button>
          <Link className="text-sm text-primary underline" to={paths.study(study.id)}>
            Not now, back to the chain
          </Link>
        </span>
      </form>
    </div>
  );
}

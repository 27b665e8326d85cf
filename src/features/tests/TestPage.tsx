import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { Study } from '../../../shared/api/studies.ts';
import { fileAddress } from '../../../shared/api/tests.ts';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import type { Test } from '../../../shared/engine/model/study-model.ts';
import { paths } from '../../api/paths.ts';
import { plainNumber } from '../../charts/plain-number.ts';
import { Loading } from '../../ui/Loading.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { ReadingsTable } from './ColumnMapping.tsx';
import { ReducedValues } from './ReducedValues.tsx';
import { readingsQuery, studyOfTestQuery } from './test-queries.ts';

/** A test: its reduced values, the readings they come from, and the original file. */
export function Component() {
  const { studyId = '', testId = '' } = useParams();
  const study = useQuery(studyOfTestQuery(studyId));
  if (study.error) return <ProblemNote error={study.error} onRetry={() => void study.refetch()} />;
  if (!study.data) return <Loading what="the test" />;
  const test = study.data.model.tests.find((one) => one.id === testId);
  if (!test) {
    return (
      <div className="grid gap-3 px-4 py-6">
        <h1 className="text-xl font-bold">No such test</h1>
        <p>It is not in this study, or it was removed; the decision log says by whom.</p>
        <Link className="text-primary underline" to={paths.study(studyId)}>
          Back to the chain
        </Link>
      </div>
    );
  }
  return <Shown study={study.data} test={test} />;
}

const summaryRows = [
  { name: 'Heater power', unit: 'W' },
  { name: 'Wall temperature', unit: 'K' },
  { name: 'Bulk temperature', unit: 'K' },
] as const;

function Shown({ study, test }: { readonly study: Study; readonly test: Test }) {
  const evaluation = useMemo(() => evaluateStudy(study.model), [study.model]);
  const readings = useQuery(readingsQuery(study.id, test.id));
  const point = study.model.operatingPoints.find((one) => one.id === test.operatingPointId);
  const { summary, flowIs } = test.reduction;
  const rows = [
    ...summaryRows,
    { name: flowIs === 'velocity' ? 'Velocity' : 'Volume flow', unit: flowIs === 'velocity' ? 'm/s' : 'm³/s' },
  ];
  const sentences = evaluation.findings
    .filter((finding) => finding.subject.id === test.id)
    .map((finding) => finding.sentence);
  return (
    <div className="mx-auto grid w-full max-w-5xl gap-6 px-4 py-6">
      <header>
        <Link className="text-sm text-primary underline" to={paths.study(study.id)}>
          {study.title}
        </Link>
        <h1 className="text-xl font-bold">{test.name}</h1>
        <p className="text-sm text-ink-2">
          Steady electric heating at {point?.name}
          {test.performedOn ? `, done on ${test.performedOn}` : ''}
        </p>
      </header>
      <ReducedValues result={evaluation.tests[test.id]} sentences={sentences} />
      <section className="grid gap-2" aria-label="Summary of the readings">
        <h2 className="text-lg font-bold">Summary of {summary.count} readings</h2>
        <table className="w-full max-w-xl border border-rule bg-surface text-sm">
          <caption className="sr-only">Mean of each column and its standard uncertainty from the scatter</caption>
          <thead>
            <tr className="border-b border-rule text-left text-xs">
              <th scope="col" className="p-2">
                Column
              </th>
              <th scope="col" className="p-2 text-right">
                Mean
              </th>
              <th scope="col" className="p-2 text-right">
                u of the mean
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row, index) => (
              <tr key={row.name} className="border-b border-hair">
                <th scope="row" className="p-2 text-left font-normal">
                  {row.name}, {row.unit}
                </th>
                <td className="num p-2 text-right">{plainNumber(summary.means[index] ?? 0, 4)}</td>
                <td className="num p-2 text-right">
                  {plainNumber(Math.sqrt(Math.max(0, summary.covarianceOfMeans[index]?.[index] ?? 0)))}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </section>
      <section className="grid gap-1 text-sm" aria-label="Original file">
        <h2 className="text-lg font-bold">Original file</h2>
        <a className="text-primary underline" href={fileAddress(study.id, test.file.id)} download>
          {test.file.name} ({plainNumber(test.file.bytes)} bytes)
        </a>
        <p>
          SHA-256 <span className="num text-xs break-all whitespace-normal">{test.file.sha256}</span>
        </p>
      </section>
      <section className="grid gap-2" aria-label="Readings">
        <h2 className="text-lg font-bold">Readings</h2>
        {readings.error && <ProblemNote error={readings.error} onRetry={() => void readings.refetch()} />}
        {readings.isPending && <Loading what="the readings" />}
        {readings.data && (
          <section
            className="max-h-120 relative overflow-auto border border-rule bg-surface"
            // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable by keyboard
            tabIndex={0}
            aria-label="All readings"
          >
            <ReadingsTable
              readings={readings.data.readings}
              caption="Every reading in SI units, with its row in the file"
            />
          </section>
        )}
      </section>
    </div>
  );
}

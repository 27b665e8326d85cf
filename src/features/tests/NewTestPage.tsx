import { useMutation, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { Study } from '../../../shared/api/studies.ts';
import { addTest, maxReadingsFileBytes } from '../../../shared/api/tests.ts';
import type { MeasuredValue, Uncertainty } from '../../../shared/engine/model/study-model.ts';
import { guessMapping } from '../../../shared/readings/guess-mapping.ts';
import { flowOf } from '../../../shared/readings/read-readings.ts';
import type { ReadingsMapping } from '../../../shared/readings/readings.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { ActionButton } from '../../ui/ActionButton.tsx';
import { Loading } from '../../ui/Loading.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { usePageTitle } from '../../ui/use-page-title.ts';
import { ColumnMapping, RawBesideRead } from './ColumnMapping.tsx';
import { ReducedValues } from './ReducedValues.tsx';
import { InstrumentField, type InstrumentKey, instrumentNames, RigFields } from './RigFields.tsx';
import { previewReduction, type Reduction, readWith } from './reduce-preview.ts';
import { studyOfTestQuery } from './test-queries.ts';
import { UseAsRoute } from './UseAsRoute.tsx';

/** From a file of steady readings to a test with its h: nothing is stored before the last button. */
export function Component() {
  const { studyId = '' } = useParams();
  const study = useQuery(studyOfTestQuery(studyId));
  if (study.data) return <NewTest study={study.data} />;
  if (study.error) return <ProblemNote error={study.error} onRetry={() => void study.refetch()} />;
  return <Loading what="the study" />;
}

type Instruments = Partial<Record<InstrumentKey, Uncertainty>>;

function NewTest({ study }: { readonly study: Study }) {
  usePageTitle('New test from steady readings');
  const [id] = useState(() => crypto.randomUUID());
  const [text, setText] = useState('');
  const [fileName, setFileName] = useState('pasted-readings.csv');
  const [file, setFile] = useState<File | null>(null);
  const [mapping, setMapping] = useState<Partial<ReadingsMapping>>({});
  const [name, setName] = useState('');
  const [performedOn, setPerformedOn] = useState('');
  const [pointId, setPointId] = useState(
    study.model.operatingPoints.find((point) => point.scale !== 'plant')?.id ??
      study.model.operatingPoints[0]?.id ??
      '',
  );
  const [instruments, setInstruments] = useState<Instruments>({});
  const [heatLoss, setHeatLoss] = useState<MeasuredValue | null>(null);
  const [surface, setSurface] = useState<Reduction['surface'] | null>(null);
  const [fileRefusal, setFileRefusal] = useState<string | null>(null);

  function take(next: string): void {
    setText(next);
    setMapping(next.trim() === '' ? {} : guessMapping(next).mapping);
  }

  async function takeFile(chosen: File): Promise<void> {
    if (chosen.size > maxReadingsFileBytes) {
      setFileRefusal(
        `${chosen.name} has ${(chosen.size / 1e6).toFixed(1)} MB; at most ${maxReadingsFileBytes / 1e6} MB are taken. Cut it to the steady readings.`,
      );
      return;
    }
    setFileRefusal(null);
    setFile(chosen);
    setFileName(chosen.name);
    if (name === '') setName(chosen.name.replace(/\.[^.]*$/, ''));
    take(await chosen.text());
  }

  const guess = text.trim() === '' ? null : guessMapping(text);
  const read = readWith(text, mapping);
  const readings = read?.file.ok ? read.file.readings : null;
  const flowIs = read ? flowOf(read.mapping) : null;
  const point = study.model.operatingPoints.find((one) => one.id === pointId);
  const whole = completeInstruments(instruments);
  const reduction: Reduction | null =
    whole && heatLoss && surface && flowIs
      ? { kind: 'steady-heating', instruments: whole, flowIs, heatLoss, surface }
      : null;
  const facts = {
    id,
    name: name.trim(),
    operatingPointId: pointId,
    performedOn: performedOn === '' ? null : performedOn,
  };
  const preview =
    readings && reduction && point
      ? previewReduction(study.model, { ...facts, name: facts.name || 'the new test' }, readings, reduction)
      : null;

  const upload = useMutation({
    mutationFn: () => {
      if (!read || !reduction) throw new Error('Something is still missing above.');
      const body = { ...facts, mapping: read.mapping, reduction };
      const sentFile = file ?? new File([text], fileName, { type: 'text/csv' });
      return call(addTest, { params: { studyId: study.id }, query: undefined, body, file: sentFile });
    },
  });

  if (upload.data) return <UseAsRoute study={study} test={upload.data.test} />;

  const missing = [
    ...(text.trim() === '' ? ['the readings'] : []),
    ...(text.trim() !== '' && !readings ? ['readings without problems'] : []),
    ...(facts.name === '' ? ['a name'] : []),
    ...(point ? [] : ['an operating point']),
    ...(whole ? [] : ['the uncertainty of every instrument']),
    ...(heatLoss ? [] : ['the heat loss']),
    ...(surface ? [] : ['the heated surface']),
  ];
  const means = readings ? meansOf(readings) : null;

  return (
    <div className="mx-auto grid w-full max-w-5xl gap-6 px-4 py-6">
      <header>
        <Link className="text-sm text-primary underline" to={paths.study(study.id)}>
          {study.title}
        </Link>
        <h1 className="text-xl font-bold">New test from steady readings</h1>
      </header>

      <Step number={1} title="Readings">
        <div className="grid gap-3 md:grid-cols-2">
          <label className="grid content-start gap-1 text-xs font-semibold">
            File (CSV, up to {maxReadingsFileBytes / 1e6} MB)
            <input
              type="file"
              accept=".csv,.txt,.tsv,text/csv,text/plain"
              className="min-h-9 border border-line bg-surface p-1.5 text-sm font-normal file:mr-3 file:border file:border-rule file:bg-sunk file:px-2 file:font-semibold"
              onChange={(event) => {
                const chosen = event.target.files?.[0];
                if (chosen) void takeFile(chosen);
              }}
            />
            {fileRefusal && (
              <span role="alert" className="text-bad">
                {fileRefusal}
              </span>
            )}
          </label>
          <label className="grid gap-1 text-xs font-semibold">
            or paste them here
            <textarea
              rows={4}
              className="num border border-line bg-surface px-2 py-1 text-xs font-normal whitespace-pre"
              value={text}
              onChange={(event) => {
                setFile(null);
                take(event.target.value);
              }}
            />
          </label>
        </div>
      </Step>

      <Step number={2} title="Columns and units">
        {guess ? (
          <>
            <ColumnMapping header={guess.header} preview={guess.preview} mapping={mapping} onChange={setMapping} />
            <RawBesideRead header={guess.header} preview={guess.preview} file={read?.file ?? null} />
          </>
        ) : (
          <p className="text-sm text-ink-2">
            Once there are readings, say here which column is what, and in which unit.
          </p>
        )}
      </Step>

      <Step number={3} title="Rig and instruments">
        <div className="grid gap-3 sm:grid-cols-3">
          <label className="grid content-start gap-1 text-xs font-semibold">
            Name of the test
            <input
              className="min-h-9 border border-line bg-surface px-2 text-sm font-normal"
              value={name}
              maxLength={200}
              onChange={(event) => setName(event.target.value)}
            />
          </label>
          <label className="grid content-start gap-1 text-xs font-semibold">
            Done on
            <input
              type="date"
              className="min-h-9 border border-line bg-surface px-2 text-sm font-normal"
              value={performedOn}
              onChange={(event) => setPerformedOn(event.target.value)}
            />
          </label>
          <label className="grid content-start gap-1 text-xs font-semibold">
            Operating point
            <select
              className="min-h-9 border border-line bg-surface px-2 text-sm font-normal"
              value={pointId}
              onChange={(event) => setPointId(event.target.value)}
            >
              {study.model.operatingPoints.length === 0 && <option value="">none in the study yet</option>}
              {study.model.operatingPoints.map((one) => (
                <option key={one.id} value={one.id}>
                  {one.name} ({one.scale})
                </option>
              ))}
            </select>
            {study.model.operatingPoints.length === 0 && (
              <Link className="font-normal text-primary underline" to={paths.study(study.id)}>
                Add the rig as an operating point first
              </Link>
            )}
          </label>
        </div>
        <div className="grid gap-3 sm:grid-cols-2 lg:grid-cols-4">
          {(Object.keys(instrumentNames) as InstrumentKey[]).map((key) => (
            <InstrumentField
              key={key}
              name={instrumentNames[key].name}
              unit={key === 'flow' && flowIs === 'volume flow in a tube' ? 'm³/s' : instrumentNames[key].unit}
              mean={means?.[key] ?? null}
              onChange={(uncertainty) =>
                setInstruments((before) => {
                  const { [key]: _, ...others } = before;
                  return uncertainty ? { ...others, [key]: uncertainty } : others;
                })
              }
            />
          ))}
        </div>
        <RigFields point={point} onHeatLoss={setHeatLoss} onSurface={setSurface} />
      </Step>

      <Step number={4} title="What comes out">
        {preview ? (
          <ReducedValues result={preview.result} sentences={preview.sentences} />
        ) : (
          <p className="text-sm text-ink-2">Still needed: {missing.join(', ')}.</p>
        )}
        {upload.error && <ProblemNote error={upload.error} />}
        <span>
          <ActionButton
            decision={
              missing.length === 0
                ? { allowed: true }
                : { allowed: false, reason: `Still needed: ${missing.join(', ')}.` }
            }
            busy={upload.isPending}
            onClick={() => upload.mutate()}
          >
            Add the test to the study
          </ActionButton>
        </span>
      </Step>
    </div>
  );
}

function completeInstruments(instruments: Instruments): Reduction['instruments'] | null {
  const { power, wallTemperature, bulkTemperature, flow } = instruments;
  return power && wallTemperature && bulkTemperature && flow ? { power, wallTemperature, bulkTemperature, flow } : null;
}

function meansOf(readings: readonly Record<InstrumentKey, number>[]): Record<InstrumentKey, number> {
  const mean = (key: InstrumentKey) => readings.reduce((sum, reading) => sum + reading[key], 0) / readings.length;
  return {
    power: mean('power'),
    wallTemperature: mean('wallTemperature'),
    bulkTemperature: mean('bulkTemperature'),
    flow: mean('flow'),
  };
}

function Step({
  number,
  title,
  children,
}: {
  readonly number: number;
  readonly title: string;
  readonly children: React.ReactNode;
}) {
  return (
    <section className="grid gap-3 border-t-2 border-rule pt-3" aria-label={title}>
      <h2 className="text-lg font-bold">
        <span className="num mr-2 text-ink-2">{number}</span>
        {title}
      </h2>
      {children}
    </section>
  );
}

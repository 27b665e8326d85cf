import { useState } from 'react';
import { Link } from 'react-router-dom';
import { type Scale, scales } from '../../../shared/engine/model/study-model.ts';
import { parseUnit } from '../../../shared/engine/quantity/parse-unit.ts';
import { paths } from '../../api/paths.ts';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { useChain, useEdit } from '../chain-context.ts';
import { newOperatingPoint, newQuantity } from '../editing/new-items.ts';
import { topologicalOrder } from '../topological-order.ts';
import { FindingList } from './Findings.tsx';
import { ChoiceField, Section, smallButton, TextField } from './fields.tsx';

/** Everything the study holds, and the ways to add to it. */
export function OverviewPanel() {
  const { state, evaluation, studyId, mayEdit, select, newId } = useChain();
  const { model } = state;
  const edit = useEdit();
  const rank = { stops: 0, warns: 1, tells: 2 };
  const findings = [...evaluation.findings].sort((a, b) => rank[a.severity] - rank[b.severity]);

  function addPoint(scale: Scale): void {
    const point = newOperatingPoint(newId(), scale, model);
    if (edit([{ kind: 'operating-point', id: point.id, body: point }], `Added the operating point ${point.name}`).ok)
      select(point.id);
  }

  const item = 'min-h-8 w-full text-left underline';
  return (
    <>
      <Section title="Operating points">
        {scales.map((scale) => (
          <div key={scale} className="grid grid-cols-[4rem_minmax(0,1fr)_auto] items-center gap-2 text-sm">
            <span className="text-xs text-ink-2">{scale}</span>
            <ul>
              {model.operatingPoints
                .filter((point) => point.scale === scale)
                .map((point) => (
                  <li key={point.id}>
                    <button type="button" className={item} onClick={() => select(point.id)}>
                      {point.name}
                    </button>
                  </li>
                ))}
            </ul>
            {mayEdit.allowed && (
              <button type="button" className={smallButton} onClick={() => addPoint(scale)}>
                + Add<span className="sr-only"> an operating point at {scale} scale</span>
              </button>
            )}
          </div>
        ))}
      </Section>
      <Section title="Quantities">
        <ul className="text-sm">
          {topologicalOrder(model).map((id) => {
            const quantity = model.quantities.find((one) => one.id === id);
            return (
              quantity && (
                <li key={id}>
                  <button type="button" className={item} onClick={() => select(id)}>
                    <Symbol_ symbol={quantity.symbol} /> {quantity.name}
                  </button>
                </li>
              )
            );
          })}
        </ul>
        {mayEdit.allowed && <AddQuantity scale={null} />}
      </Section>
      <Section title="Tests">
        <ul className="text-sm">
          {model.tests.map((test) => (
            <li key={test.id}>
              <Link className="inline-block min-h-8 py-1 underline" to={paths.test(studyId, test.id)}>
                {test.name}
              </Link>
            </li>
          ))}
        </ul>
        {mayEdit.allowed && (
          <span>
            <Link className={`${smallButton} inline-flex items-center`} to={paths.newTest(studyId)}>
              + Upload readings
            </Link>
          </span>
        )}
      </Section>
      {findings.length > 0 && (
        <Section title="Findings" aside={<span className="text-xs text-ink-2">{findings.length}</span>}>
          <FindingList findings={findings} from={null} />
        </Section>
      )}
    </>
  );
}

/** Adds a quantity; without an operating point to stand at, one is added at the given scale in the same step. */
export function AddQuantity({ scale }: { readonly scale: Scale | null }) {
  const { state, select, newId } = useChain();
  const { model } = state;
  const edit = useEdit();
  const [open, setOpen] = useState(scale !== null);
  const [symbol, setSymbol] = useState('');
  const [name, setName] = useState('');
  const [unit, setUnit] = useState('');
  const [pointId, setPointId] = useState('');
  const [refusal, setRefusal] = useState<string | null>(null);
  const unitRead = parseUnit(unit);
  const chosenPoint = model.operatingPoints.find((point) => point.id === pointId) ?? model.operatingPoints.at(-1);

  function add(): void {
    const point = chosenPoint ?? newOperatingPoint(newId(), scale ?? 'plant', model);
    const quantity = newQuantity(newId(), { symbol, name, unit, operatingPointId: point.id });
    const outcome = edit(
      [
        ...(chosenPoint ? [] : [{ kind: 'operating-point' as const, id: point.id, body: point }]),
        { kind: 'quantity', id: quantity.id, body: quantity },
      ],
      `Added ${name}`,
    );
    if (!outcome.ok) {
      setRefusal(outcome.sentence);
      return;
    }
    setSymbol('');
    setName('');
    setUnit('');
    setOpen(false);
    select(quantity.id);
  }

  if (!open) {
    return (
      <span>
        <button type="button" className={smallButton} onClick={() => setOpen(true)}>
          + Add a quantity
        </button>
      </span>
    );
  }
  const take = (set: (text: string) => void) => (text: string) => {
    set(text);
    return { ok: true as const };
  };
  return (
    <form
      className="grid gap-2 border border-rule bg-surface p-3"
      aria-label="Add a quantity"
      onSubmit={(event) => {
        event.preventDefault();
        add();
      }}
    >
      <TextField label="Name" value={name} hint="e.g. Wall mass-transfer coefficient" onChange={take(setName)} />
      <div className="grid grid-cols-2 gap-2">
        <TextField label="Symbol" value={symbol} hint="k_w shows w below" onChange={take(setSymbol)} />
        <TextField
          label="Unit shown"
          mono
          value={unit}
          hint="e.g. mm/s; 1 for none"
          onChange={(text) => {
            setUnit(text);
            const read = parseUnit(text);
            return read.ok ? { ok: true } : { ok: false, sentence: read.reason };
          }}
        />
      </div>
      {model.operatingPoints.length > 0 && (
        <ChoiceField
          label="Operating point"
          value={chosenPoint?.id ?? ''}
          options={model.operatingPoints.map((point) => ({ value: point.id, words: point.name, group: point.scale }))}
          onChange={take(setPointId)}
        />
      )}
      {refusal && (
        <p role="alert" className="text-xs font-semibold text-bad">
          {refusal}
        </p>
      )}
      <span className="flex gap-2">
        <button type="submit" className={smallButton} disabled={name === '' || symbol === '' || !unitRead.ok}>
          Add the quantity
        </button>
        {scale === null && (
          <button type="button" className="min-h-8 px-2 text-xs underline" onClick={() => setOpen(false)}>
            Cancel
          </button>
        )}
      </span>
    </form>
  );
}

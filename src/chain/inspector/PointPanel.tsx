import { useState } from 'react';
import { findPointVariable, pointVariables } from '../../../shared/engine/model/point-variables.ts';
import {
  geometryFamilies,
  type OperatingPoint,
  type PointEntry,
  type PointVariableKey,
  pointVariableKeys,
  type Scale,
  scales,
} from '../../../shared/engine/model/study-model.ts';
import { Measured } from '../../ui/Measured.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { useChain, useEdit } from '../chain-context.ts';
import type { EditOutcome } from '../editing/chain-document.ts';
import { usersOfPoint } from '../editing/remove-items.ts';
import { QuantityField } from '../QuantityField.tsx';
import { Findings } from './Findings.tsx';
import { ChoiceField, NumberField, Section, smallButton, TextField } from './fields.tsx';
import { ItemLockNote } from './ItemLockNote.tsx';
import { useItemLock } from './use-route-edit.ts';

type Change = (part: Partial<OperatingPoint>, field: string) => EditOutcome;

/** An operating point: geometry, fluid, what is entered, and the groups that follow at once. */
export function PointPanel({ point }: { readonly point: OperatingPoint }) {
  const { state, document, select } = useChain();
  const edit = useEdit();
  const locked = !useItemLock(point.id).allowed;
  const seal = () => document.seal();
  const change: Change = (part, field) =>
    edit(
      [{ kind: 'operating-point', id: point.id, body: { ...point, ...part } }],
      `Changed ${field} at ${point.name}`,
      `point:${point.id}:${field}`,
    );
  const users = usersOfPoint(state.model, point.id);
  return (
    <>
      <p className="text-xs text-ink-2">Operating point at {point.scale} scale</p>
      <ItemLockNote id={point.id} />
      <Findings kind="operating-point" id={point.id} />
      <Section title="Groups that follow">
        <Readings point={point} />
      </Section>
      <Section title="Entered">
        <Entries point={point} locked={locked} change={change} />
      </Section>
      <Section title="Geometry and fluid">
        <TextField
          label="Name"
          value={point.name}
          disabled={locked}
          onSettle={seal}
          onChange={(name) =>
            name === '' ? { ok: false, sentence: 'An operating point needs a name.' } : change({ name }, 'the name')
          }
        />
        <div className="grid grid-cols-2 gap-2">
          <ChoiceField
            label="Scale"
            value={point.scale}
            disabled={locked}
            options={scales.map((scale) => ({ value: scale, words: scale }))}
            onChange={(scale) => change({ scale: scale as Scale }, 'the scale')}
          />
          <ChoiceField
            label="Geometry family"
            value={point.geometry.family}
            disabled={locked}
            options={geometryFamilies.map((family) => ({ value: family, words: family }))}
            onChange={(family) =>
              change(
                { geometry: { ...point.geometry, family: family as OperatingPoint['geometry']['family'] } },
                'the geometry family',
              )
            }
          />
        </div>
        <TextField
          label="Description"
          multiline
          value={point.geometry.description}
          disabled={locked}
          onSettle={seal}
          onChange={(description) => change({ geometry: { ...point.geometry, description } }, 'the description')}
        />
        <TextField
          label="Fluid"
          value={point.fluid}
          disabled={locked}
          onSettle={seal}
          onChange={(fluid) => change({ fluid }, 'the fluid')}
        />
        <Ratios point={point} locked={locked} change={change} />
      </Section>
      {!locked && (
        <p className="grid gap-1 text-xs">
          <span>
            <button
              type="button"
              className={`${smallButton} text-bad`}
              disabled={users.length > 0}
              onClick={() => {
                if (edit([{ kind: 'operating-point', id: point.id, body: null }], `Removed ${point.name}`).ok)
                  select(null);
              }}
            >
              Remove this operating point
            </button>
          </span>
          {users.length > 0 && <span className="text-ink-2">In use by {users.join(', ')}.</span>}
        </p>
      )}
    </>
  );
}

function Readings({ point }: { readonly point: OperatingPoint }) {
  const { evaluation } = useChain();
  const entered = new Set<string>(point.entries.map((entry) => entry.key));
  const following = (evaluation.points[point.id] ?? []).filter((reading) => !entered.has(reading.key));
  if (following.length === 0)
    return (
      <p className="text-sm text-ink-2">Enter length, velocity and properties below; Re, Pr, Sc follow from them.</p>
    );
  return (
    <table className="w-full text-sm">
      <caption className="sr-only">Values that follow from what is entered</caption>
      <tbody>
        {following.map((reading) => {
          const variable = findPointVariable(reading.key);
          return (
            <tr key={reading.key} className="border-b border-hair">
              <th scope="row" className="py-1 text-left font-normal">
                <Symbol_ symbol={variable?.symbol ?? reading.key} />{' '}
                <span className="text-xs text-ink-2">{reading.origin}</span>
              </th>
              <td className="text-right">
                <Measured value={reading.value} u={reading.u} unit={variable?.unit ?? '1'} />
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

function Entries({
  point,
  locked,
  change,
}: {
  readonly point: OperatingPoint;
  readonly locked: boolean;
  readonly change: Change;
}) {
  const { state, document, held } = useChain();
  const [adding, setAdding] = useState<readonly PointVariableKey[]>([]);
  const keys = pointVariableKeys.filter(
    (key) => point.entries.some((entry) => entry.key === key) || adding.includes(key) || held.has(`${point.id}:${key}`),
  );
  const missing = pointVariableKeys.filter((key) => !keys.includes(key));

  function put(entry: PointEntry): EditOutcome {
    const others = point.entries.filter((one) => one.key !== entry.key);
    const place = point.entries.findIndex((one) => one.key === entry.key);
    const entries = place < 0 ? [...others, entry] : point.entries.map((one) => (one.key === entry.key ? entry : one));
    return change({ entries }, `the ${pointVariables[entry.key].name}`);
  }

  function drop(key: PointVariableKey): void {
    setAdding(adding.filter((one) => one !== key));
    held.delete(`${point.id}:${key}`);
    if (point.entries.some((entry) => entry.key === key)) {
      change({ entries: point.entries.filter((entry) => entry.key !== key) }, `the ${pointVariables[key].name}`);
    }
  }

  return (
    <div className="grid gap-3">
      {keys.map((key) => {
        const entry = point.entries.find((one) => one.key === key);
        const variable = pointVariables[key];
        const fromTest = entry?.source.from === 'test' ? entry.source.testId : null;
        return (
          <div key={key} className="grid gap-1">
            {fromTest === null ? (
              <EntryField
                point={point}
                variableKey={key}
                entry={entry}
                locked={locked}
                put={put}
                onSettle={() => document.seal()}
              />
            ) : (
              <p className="text-sm">
                <span className="font-semibold">
                  {variable.symbol}, {variable.name}
                </span>
                : measured by {state.model.tests.find((test) => test.id === fromTest)?.name ?? 'a test'}
              </p>
            )}
            {!locked && (
              <span className="flex flex-wrap gap-2">
                <button type="button" className="min-h-7 text-xs text-ink-2 underline" onClick={() => drop(key)}>
                  Remove {variable.symbol}
                </button>
                {key === 'u' &&
                  state.model.tests
                    .filter((test) => test.operatingPointId === point.id && test.id !== fromTest)
                    .map((test) => (
                      <button
                        key={test.id}
                        type="button"
                        className="min-h-7 text-xs text-primary underline"
                        onClick={() => put({ key, source: { from: 'test', testId: test.id } })}
                      >
                        Take it from {test.name}
                      </button>
                    ))}
              </span>
            )}
          </div>
        );
      })}
      {!locked && missing.length > 0 && (
        <ChoiceField
          label="Add an entry"
          value=""
          options={[
            { value: '', words: 'Choose what to enter' },
            ...missing.map((key) => ({
              value: key,
              words: `${pointVariables[key].symbol}, ${pointVariables[key].name}`,
            })),
          ]}
          onChange={(key) => {
            if (key !== '') setAdding([...adding, key as PointVariableKey]);
            return { ok: true };
          }}
        />
      )}
    </div>
  );
}

function EntryField({
  point,
  variableKey,
  entry,
  locked,
  put,
  onSettle,
}: {
  readonly point: OperatingPoint;
  readonly variableKey: PointVariableKey;
  readonly entry: PointEntry | undefined;
  readonly locked: boolean;
  readonly put: (entry: PointEntry) => EditOutcome;
  readonly onSettle: () => void;
}) {
  const { held } = useChain();
  const [refusal, setRefusal] = useState<string | null>(null);
  const variable = pointVariables[variableKey];
  const holdKey = `${point.id}:${variableKey}`;
  return (
    <QuantityField
      label={`${variable.symbol}, ${variable.name}`}
      meaning={variable.name}
      unit={variable.unit}
      value={entry?.source.from === 'entered' ? entry.source.value : null}
      disabled={locked}
      refusal={refusal}
      held={held.get(holdKey)}
      onHold={(text) => {
        setRefusal(null);
        if (text) held.set(holdKey, text);
        else held.delete(holdKey);
      }}
      onSettle={onSettle}
      onChange={(value) => {
        const outcome = put({ key: variableKey, source: { from: 'entered', value } });
        setRefusal(outcome.ok ? null : outcome.sentence);
      }}
    />
  );
}

function Ratios({
  point,
  locked,
  change,
}: {
  readonly point: OperatingPoint;
  readonly locked: boolean;
  readonly change: Change;
}) {
  const { ratios } = point.geometry;
  const put = (next: OperatingPoint['geometry']['ratios']) =>
    change({ geometry: { ...point.geometry, ratios: next } }, 'the length ratios');
  return (
    <fieldset className="grid gap-2">
      <legend className="pb-1 text-xs font-semibold">Length ratios that must be equal for similarity</legend>
      {ratios.map((ratio, index) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: ratios have no id and are only added at the end
        <div key={index} className="grid grid-cols-[1fr_1fr_auto] items-start gap-2">
          <TextField
            label="Ratio"
            value={ratio.name}
            disabled={locked}
            onChange={(name) =>
              name === ''
                ? { ok: false, sentence: 'Name it, e.g. L/d.' }
                : put(ratios.map((one, i) => (i === index ? { ...one, name } : one)))
            }
          />
          <NumberField
            label="Value"
            value={ratio.value}
            disabled={locked}
            onChange={(value) =>
              (value ?? 0) > 0
                ? put(ratios.map((one, i) => (i === index ? { ...one, value: value ?? 1 } : one)))
                : { ok: false, sentence: 'A ratio of lengths is above zero.' }
            }
          />
          <button
            type="button"
            className={`${smallButton} mt-6`}
            disabled={locked}
            onClick={() => put(ratios.filter((_, i) => i !== index))}
          >
            Remove<span className="sr-only"> {ratio.name}</span>
          </button>
        </div>
      ))}
      {!locked && (
        <span>
          <button type="button" className={smallButton} onClick={() => put([...ratios, { name: 'L/d', value: 1 }])}>
            + Ratio
          </button>
        </span>
      )}
    </fieldset>
  );
}

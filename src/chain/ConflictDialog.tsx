import { useState } from 'react';
import { Dialog } from '../ui/Dialog.tsx';
import { useChain } from './chain-context.ts';
import type { Conflict } from './editing/chain-document.ts';
import { conflictFields, fieldWords, mergeConflict, type Side, valueWords } from './editing/conflict-fields.ts';
import { smallButton } from './inspector/fields.tsx';

/** Somebody else changed the same thing: both versions, field by field, and a choice for each. */
export function ConflictDialog() {
  const { state, document } = useChain();
  const [choices, setChoices] = useState<Readonly<Record<string, Readonly<Record<string, Side>>>>>({});

  function choose(conflict: Conflict, field: string, side: Side): void {
    setChoices({ ...choices, [conflict.id]: { ...choices[conflict.id], [field]: side } });
  }

  function resolve(): void {
    document.resolve(
      state.conflicts.map((conflict) => ({
        kind: conflict.kind,
        id: conflict.id,
        body: mergeConflict(conflict, choices[conflict.id] ?? {}),
      })),
    );
  }

  return (
    <Dialog open title="Somebody else changed this too" onClose={resolve}>
      <p className="text-sm">Choose for each difference. What you do not touch keeps your version.</p>
      {state.conflicts.map((conflict) => (
        <OneConflict
          key={conflict.id}
          conflict={conflict}
          choices={choices[conflict.id] ?? {}}
          onChoose={(field, side) => choose(conflict, field, side)}
        />
      ))}
      <p className="pt-3">
        <button type="button" className={smallButton} onClick={resolve}>
          Save what is chosen
        </button>
      </p>
    </Dialog>
  );
}

function OneConflict({
  conflict,
  choices,
  onChoose,
}: {
  readonly conflict: Conflict;
  readonly choices: Readonly<Record<string, Side>>;
  readonly onChoose: (field: string, side: Side) => void;
}) {
  const either = conflict.yours ?? conflict.theirs;
  const name = either && 'name' in either ? either.name : 'an item';
  const fields = conflictFields(conflict);
  const rows =
    fields.length > 0
      ? fields
      : [
          {
            field: '*',
            yours: conflict.yours === null ? 'removed' : 'kept',
            theirs: conflict.theirs === null ? 'removed' : 'kept',
          },
        ];
  return (
    <div className="relative overflow-x-auto pt-3">
      <table className="w-full border border-rule text-sm">
        <caption className="pb-1 text-left font-semibold">{name}</caption>
        <thead>
          <tr className="border-b border-rule text-left text-xs">
            <th scope="col" className="p-2">
              Field
            </th>
            <th scope="col" className="p-2">
              Yours
            </th>
            <th scope="col" className="p-2">
              Theirs
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ field, yours, theirs }) => (
            <tr key={field} className="border-b border-hair align-top">
              <th scope="row" className="p-2 text-left font-normal">
                {field === '*' ? 'the whole item' : fieldWords(field)}
              </th>
              {(['yours', 'theirs'] as const).map((side) => (
                <td key={side} className="p-2">
                  <label className="flex gap-2">
                    <input
                      type="radio"
                      name={`${conflict.id}:${field}`}
                      checked={(choices[field] ?? 'yours') === side}
                      onChange={() => onChoose(field, side)}
                    />
                    <span className="num text-xs whitespace-pre-wrap">
                      {valueWords(side === 'yours' ? yours : theirs)}
                    </span>
                  </label>
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

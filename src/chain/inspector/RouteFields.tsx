import { Link } from 'react-router-dom';
import type { Route } from '../../../shared/engine/model/study-model.ts';
import { paths } from '../../api/paths.ts';
import { useChain } from '../chain-context.ts';
import { QuantityField } from '../QuantityField.tsx';
import { ChoiceField, NumberField, TextField } from './fields.tsx';
import { useRouteEdit } from './use-route-edit.ts';

type RouteOf<Kind extends Route['kind']> = Extract<Route, { kind: Kind }>;
export type RouteFieldsProps<Kind extends Route['kind']> = { readonly route: RouteOf<Kind>; readonly locked: boolean };

export function StatedValueFields({ route, locked }: RouteFieldsProps<'stated-value'>) {
  const { state, document, held } = useChain();
  const change = useRouteEdit(route);
  const quantity = state.model.quantities.find((one) => one.id === route.quantityId);
  return (
    <>
      <QuantityField
        label="Value"
        meaning={quantity?.name ?? 'the quantity'}
        unit={quantity?.unit ?? ''}
        value={route.value}
        disabled={locked}
        held={held.get(route.id)}
        onHold={(text) => (text ? held.set(route.id, text) : held.delete(route.id))}
        onSettle={() => document.seal()}
        onChange={(value) => change({ value }, 'the value')}
      />
      <TextField
        label="Evidence"
        multiline
        value={route.evidence}
        disabled={locked}
        hint="Data sheet, handbook with edition and page, or who said it and when."
        onSettle={() => document.seal()}
        onChange={(evidence) => change({ evidence }, 'the evidence')}
      />
    </>
  );
}

export function TestResultFields({ route, locked }: RouteFieldsProps<'test-result'>) {
  const { state, studyId } = useChain();
  const change = useRouteEdit(route);
  const test = state.model.tests.find((one) => one.id === route.testId);
  return (
    <>
      <ChoiceField
        label="Test"
        value={route.testId ?? ''}
        disabled={locked}
        options={[
          { value: '', words: 'No test chosen' },
          ...state.model.tests.map((one) => ({ value: one.id, words: one.name })),
        ]}
        onChange={(id) => change({ testId: id === '' ? null : id }, 'the test')}
      />
      <p className="flex flex-wrap gap-4 text-sm">
        {test && (
          <Link className="text-primary underline" to={paths.test(studyId, test.id)}>
            See the readings of {test.name}
          </Link>
        )}
        {!locked && (
          <Link className="text-primary underline" to={paths.newTest(studyId)}>
            Upload readings
          </Link>
        )}
      </p>
    </>
  );
}

function Exponent({
  label,
  exponent,
  locked,
  onChange,
}: {
  readonly label: string;
  readonly exponent: { readonly value: number; readonly u: number };
  readonly locked: boolean;
  readonly onChange: (
    exponent: { value: number; u: number },
    part: string,
  ) => ReturnType<ReturnType<typeof useRouteEdit>>;
}) {
  const { document } = useChain();
  return (
    <div className="grid grid-cols-2 gap-2">
      <NumberField
        label={label}
        value={exponent.value}
        disabled={locked}
        onSettle={() => document.seal()}
        onChange={(value) => onChange({ ...exponent, value: value ?? 0 }, label)}
      />
      <NumberField
        label={`u of ${label}`}
        value={exponent.u}
        disabled={locked}
        onSettle={() => document.seal()}
        onChange={(u) => onChange({ ...exponent, u: u ?? 0 }, `u of ${label}`)}
      />
    </div>
  );
}

/** The allowance for use outside a window: a line of its own in the budget. */
export function AllowanceField({ route, locked }: RouteFieldsProps<'heat-analogue'> | RouteFieldsProps<'correlation'>) {
  const { document } = useChain();
  const change = useRouteEdit(route);
  return (
    <NumberField
      label="Extrapolation allowance, relative u"
      percent
      value={route.extrapolationAllowance}
      disabled={locked}
      emptyMeans="none. Outside a window add one, or justify why none is needed."
      onSettle={() => document.seal()}
      onChange={(extrapolationAllowance) =>
        change({ extrapolationAllowance } as Partial<typeof route>, 'the extrapolation allowance')
      }
    />
  );
}

export function HeatAnalogueFields({ route, locked }: RouteFieldsProps<'heat-analogue'>) {
  const { state, document } = useChain();
  const change = useRouteEdit(route);
  return (
    <>
      <ChoiceField
        label="Measured heat-transfer coefficient"
        value={route.sourceQuantityId ?? ''}
        disabled={locked}
        options={[
          { value: '', words: 'Not linked yet' },
          ...state.model.quantities
            .filter((quantity) => quantity.id !== route.quantityId)
            .map((quantity) => ({ value: quantity.id, words: `${quantity.symbol}, ${quantity.name}` })),
        ]}
        onChange={(id) => change({ sourceQuantityId: id === '' ? null : id }, 'the source quantity')}
      />
      <Exponent
        label="Reynolds exponent m"
        exponent={route.reynoldsExponent}
        locked={locked}
        onChange={(reynoldsExponent, part) => change({ reynoldsExponent }, part)}
      />
      <Exponent
        label="Schmidt exponent n"
        exponent={route.schmidtExponent}
        locked={locked}
        onChange={(schmidtExponent, part) => change({ schmidtExponent }, part)}
      />
      <NumberField
        label="Scatter of the analogy, relative u"
        percent
        value={route.scatter}
        disabled={locked}
        onSettle={() => document.seal()}
        onChange={(scatter) => change({ scatter: scatter ?? 0 }, 'the scatter')}
      />
      <AllowanceField route={route} locked={locked} />
    </>
  );
}

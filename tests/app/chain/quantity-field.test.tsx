import { cleanup, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it } from 'vitest';
import type { MeasuredValue } from '../../../shared/engine/model/study-model.ts';
import type { HeldText } from '../../../src/chain/chain-context.ts';
import { QuantityField } from '../../../src/chain/QuantityField.tsx';

afterEach(cleanup);

function show(value: MeasuredValue | null = null, held?: HeldText) {
  const taken: MeasuredValue[] = [];
  const kept: (HeldText | null)[] = [];
  const field = (next: MeasuredValue | null) => (
    <QuantityField
      label="ν, kinematic viscosity"
      meaning="kinematic viscosity"
      unit="m²/s"
      value={next}
      held={held}
      onChange={(one) => taken.push(one)}
      onHold={(text) => kept.push(text)}
    />
  );
  const { rerender } = render(field(value));
  return { taken, kept, setValue: (next: MeasuredValue) => rerender(field(next)) };
}

const valueBox = () => screen.getByLabelText(/^ν, kinematic viscosity \(/);
const uncertaintyBox = () => screen.getByLabelText('Uncertainty of ν, kinematic viscosity');

describe('a quantity field', () => {
  it('echoes what it understood with U, the unit and what it was read as', async () => {
    const { taken } = show();

    await userEvent.type(valueBox(), '1.2e-6 m2/s');
    await userEvent.selectOptions(screen.getByLabelText(/How the uncertainty/), 'u, relative (%)');
    await userEvent.type(uncertaintyBox(), '3 %');

    expect(taken.at(-1)).toMatchObject({
      text: '1.2e-6 m2/s',
      value: 1.2e-6,
      uncertainty: { form: 'relative', fraction: 0.03 },
    });
    expect(screen.getByText(/= .*1\.2.*k = 2.*read as kinematic viscosity/)).toBeDefined();
  });

  it('keeps text it does not understand, says why, and hands nothing on', async () => {
    const { taken, kept } = show();

    await userEvent.type(valueBox(), '1,234');

    expect((valueBox() as HTMLInputElement).value).toBe('1,234');
    expect(screen.getByRole('alert').textContent).not.toBe('');
    expect(kept.at(-1)).toEqual({ text: '1,234', uncertaintyText: '' });
    expect(taken).toEqual([]);
  });

  it('shows text that was held back when it is opened again', () => {
    show(null, { text: '35 furlong', uncertaintyText: '1 %' });

    expect((valueBox() as HTMLInputElement).value).toBe('35 furlong');
    expect(screen.getByRole('alert')).toBeDefined();
  });

  it('never rewrites what is being typed, and follows an undo from outside', async () => {
    const one: MeasuredValue = {
      text: '1.0e-6',
      value: 1e-6,
      unit: 'm²/s',
      uncertaintyText: '',
      uncertainty: { form: 'exact' },
    };
    const { taken, setValue } = show(one);

    await userEvent.type(valueBox(), '0');
    expect((valueBox() as HTMLInputElement).value).toBe('1.0e-60');
    setValue(taken.at(-1) as MeasuredValue);
    expect((valueBox() as HTMLInputElement).value).toBe('1.0e-60');
    setValue(one);

    expect((valueBox() as HTMLInputElement).value).toBe('1.0e-6');
  });
});

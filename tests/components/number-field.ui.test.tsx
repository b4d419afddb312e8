import { render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { beforeEach, describe, expect, it } from 'vitest';
import { ThicknessField } from '@/components/ui/form-fields.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { chooseUnitSystem } from '@/components/ui/unit-system.ts';
import type { Dimension } from '@/strategy/units/index.ts';

let value: number | null = null;

function Held({ dimension, start = null, unit }: { dimension: Dimension; start?: number | null; unit?: string }) {
  const [held, setHeld] = useState<number | null>(start);
  const take = (next: number | null) => {
    value = next;
    setHeld(next);
  };
  return (
    <>
      <NumberField label="Standoff" dimension={dimension} unit={unit} value={held} onChange={take} />
      <button onClick={() => take(0.004)}>Propose</button>
    </>
  );
}

const field = () => screen.getByLabelText<HTMLInputElement>('Standoff');

beforeEach(() => {
  value = null;
  chooseUnitSystem('metric');
});

describe('a field for a quantity', () => {
  it('takes a fraction of an inch and says how it was understood', async () => {
    render(<Held dimension="length" />);
    await userEvent.type(field(), '3/4 in');
    expect(value).toBeCloseTo(0.01905, 12);
    expect(screen.getByText(/0\.75 in = 19\.05 mm/)).toBeTruthy();
    expect(field().value).toBe('3/4 in');
  });

  it('takes a bare number in the unit that stands beside it', async () => {
    render(<Held dimension="length" />);
    await userEvent.type(field(), '12,7');
    expect(value).toBeCloseTo(0.0127, 12);
    expect(screen.queryByText(/understood/)).toBeNull();
  });

  it('takes bare numbers as inches on a device set to inches', async () => {
    chooseUnitSystem('inch');
    render(<Held dimension="length" />);
    await userEvent.type(field(), '0.5');
    expect(value).toBeCloseTo(0.0127, 12);
  });

  it('refuses what is no number, keeps it, and hands over nothing a schema would take', async () => {
    render(<Held dimension="length" />);
    await userEvent.type(field(), 'thick');
    expect(value).toBeNaN();
    expect(field().getAttribute('aria-invalid')).toBe('false');
    await userEvent.tab();
    expect(field().value).toBe('thick');
    expect(field().getAttribute('aria-invalid')).toBe('true');
    expect(screen.getByText(/does not begin with a number/)).toBeTruthy();
  });

  it('refuses a unit of another kind of quantity', async () => {
    render(<Held dimension="pressure" />);
    await userEvent.type(field(), '4 mm');
    await userEvent.tab();
    expect(value).toBeNaN();
    expect(screen.getByText(/is not a unit that fits here/)).toBeTruthy();
  });

  it('is empty again when it was emptied', async () => {
    render(<Held dimension="length" start={0.01} />);
    expect(field().value).toBe('10');
    await userEvent.clear(field());
    expect(value).toBeNull();
    expect(field().value).toBe('');
  });

  it('follows a value that was set from outside', async () => {
    render(<Held dimension="length" />);
    await userEvent.type(field(), 'garbage');
    await userEvent.click(screen.getByText('Propose'));
    expect(field().value).toBe('4');
  });

  it('shows a value in its own unit without touching it', () => {
    render(<Held dimension="angle" unit="mrad" start={0.07} />);
    expect(field().value).toBe('70');
    expect(value).toBeNull();
  });

  it('keeps plate thickness in whole micrometres', async () => {
    let micrometres: number | null = null;
    function Thickness() {
      const [held, setHeld] = useState<number | null>(null);
      return (
        <ThicknessField
          label="Thickness"
          value={held}
          onChange={(next) => {
            micrometres = next;
            setHeld(next);
          }}
        />
      );
    }
    render(<Thickness />);
    await userEvent.type(screen.getByLabelText('Thickness'), '3/4 in');
    expect(micrometres).toBe(19_050);
    expect(screen.getByLabelText<HTMLInputElement>('Thickness').value).toBe('3/4 in');
  });
});

import { render, screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { problemOfFields } from '../support/problems.ts';
import { machineOf, profileOf } from '../support/machine-rows.ts';
import { blankMachine, MachineForm, type MachineFormOut } from '@/components/machines/machine-form.tsx';
import { MachineReviseForm } from '@/components/machines/machine-revise-form.tsx';
import { FocusReading } from '@/components/machines/focus-reading.tsx';
import { json, problem, serveWith, show } from '../support/page.tsx';

afterEach(() => vi.unstubAllGlobals());

const filled = { name: 'No. 2', note: '', profile: profileOf() };
const nothing = () => undefined;
const field = (label: string | RegExp) => screen.getByLabelText<HTMLInputElement>(label);

describe('the form of a machine', () => {
  it('says at each field what is missing when it is sent empty', async () => {
    const onSubmit = vi.fn();
    render(<MachineForm start={blankMachine} named action="Add" error={null} busy={false} onSubmit={onSubmit} />);
    await userEvent.click(screen.getByRole('button', { name: 'Add' }));
    expect(await screen.findByText('A name is needed.')).toBeTruthy();
    expect(screen.getByText('Give a number: 0.1 to 60 kW.')).toBeTruthy();
    expect(field('Greatest peak power').getAttribute('aria-invalid')).toBe('true');
    expect(onSubmit).not.toHaveBeenCalled();
  });

  it('says on leaving a field that its number is out of range, and not before', async () => {
    render(<MachineForm start={filled} named action="Add" error={null} busy={false} onSubmit={nothing} />);
    const power = field('Greatest peak power');
    await userEvent.clear(power);
    await userEvent.type(power, '90');
    expect(screen.queryByText('Must be within 0.1 to 60 kW.')).toBeNull();
    await userEvent.tab();
    expect(await screen.findByText('Must be within 0.1 to 60 kW.')).toBeTruthy();
    expect(power.value).toBe('90');
  });

  it('finds a least power above the greatest', async () => {
    render(<MachineForm start={filled} named action="Add" error={null} busy={false} onSubmit={nothing} />);
    await userEvent.clear(field('Least peak power'));
    await userEvent.type(field('Least peak power'), '12 kW');
    await userEvent.click(screen.getByRole('button', { name: 'Add' }));
    expect(await screen.findByText('The least power must be below the greatest.')).toBeTruthy();
  });

  it('hands over SI, whatever unit was typed', async () => {
    let given: MachineFormOut | null = null;
    render(
      <MachineForm
        start={filled}
        named
        action="Add"
        error={null}
        busy={false}
        onSubmit={(out) => {
          given = out;
        }}
      />,
    );
    const type = async (label: string | RegExp, text: string) => {
      await userEvent.clear(field(label));
      await userEvent.type(field(label), text);
    };
    await type('Greatest peak power', '6000 W');
    await type('Greatest pressure', '87 psi');
    await type('Greatest standoff', '1 1/2 in');
    await type(/^Height while it travels/, '20');
    await userEvent.click(screen.getByRole('button', { name: 'Add' }));
    await waitFor(() => expect(given).not.toBeNull());
    expect(given).toHaveProperty('profile.source.maxPower', 6000);
    expect(given).toHaveProperty('profile.standoff.max', expect.closeTo(0.0381, 12));
    expect(given).toHaveProperty('profile.oxygen.maxPressure', expect.closeTo(599_844, -1));
    // what only estimates need may stay empty
    expect(given).toHaveProperty('profile.heights.travel', expect.closeTo(0.02, 12));
    expect(given).not.toHaveProperty('profile.loading.time', expect.anything());
  });

  it('puts what the server said on its fields, and keeps what was typed', async () => {
    const error = problemOfFields([
      { pointer: '/name', detail: 'Another machine has this name.' },
      { pointer: '/profile/axes/jerk', detail: 'Not with this acceleration.' },
    ]);
    const { rerender } = render(
      <MachineForm start={filled} named action="Add" error={null} busy={false} onSubmit={nothing} />,
    );
    await userEvent.clear(field('Name'));
    await userEvent.type(field('Name'), 'No. 3');
    rerender(<MachineForm start={filled} named action="Add" error={error} busy={false} onSubmit={nothing} />);
    expect(await screen.findByText('Another machine has this name.')).toBeTruthy();
    expect(screen.getByText('Not with this acceleration.')).toBeTruthy();
    expect(field('Jerk').getAttribute('aria-invalid')).toBe('true');
    expect(field('Name').value).toBe('No. 3');
  });
});

describe('the focus dial', () => {
  it('reads a reversed scale of 2.2 to 1 both ways', () => {
    render(<FocusReading scale={profileOf().focusScale} />);
    expect(screen.getByText('To have the focus at +5 mm, type −2.27.')).toBeTruthy();
    expect(screen.getByText('Typing +1.00 puts it at −2.2 mm.')).toBeTruthy();
    expect(screen.getByText(/runs the other way/)).toBeTruthy();
  });

  it('says when the dial does not reach the position', () => {
    render(<FocusReading scale={{ ...profileOf().focusScale, minDial: -0.002 }} />);
    expect(screen.getByText(/which takes −2 mm to/)).toBeTruthy();
  });

  it('names the standoff of its example when it is counted from the nozzle tip', () => {
    render(<FocusReading scale={{ ...profileOf().focusScale, reference: 'nozzle', slope: 1 }} />);
    expect(screen.getByText('To have the focus at +5 mm, type −5.00.')).toBeTruthy();
    expect(screen.getByText(/At a standoff of 10 mm/)).toBeTruthy();
  });

  it('shows the reading while the scale is typed', async () => {
    render(<MachineForm start={filled} named={false} action="Save" error={null} busy={false} onSubmit={nothing} />);
    await userEvent.clear(field('Travel per millimetre typed'));
    await userEvent.type(field('Travel per millimetre typed'), '-2');
    expect(await screen.findByText('To have the focus at +5 mm, type −2.50.')).toBeTruthy();
  });
});

describe('a machine’s next revision', () => {
  it('keeps what was typed when somebody wrote one meanwhile, and saves over the newest only after it was loaded', async () => {
    const machine = machineOf({ version: 3 });
    const newer = machineOf({ version: 4, revisions: 2 });
    const onDone = vi.fn();
    const requests = serveWith((asked) => {
      if (asked.method === 'GET') return json(newer);
      return asked.headers.get('if-match') === '"4"' ? json(machineOf({ version: 5, revisions: 3 })) : problem('stale');
    });
    const [from] = machine.revisions;
    if (from === undefined) throw new Error('the machine has a revision');
    show(<MachineReviseForm machine={machine} from={from} onDone={onDone} />);
    await userEvent.type(field(/What changed, and why/), 'Collimator exchanged.');
    await userEvent.click(screen.getByRole('button', { name: 'Save revision 2' }));
    expect(await screen.findByText('Somebody changed this meanwhile')).toBeTruthy();
    expect(field(/What changed, and why/).value).toBe('Collimator exchanged.');
    await userEvent.click(screen.getByRole('button', { name: 'Load the newest' }));
    expect(await screen.findByText(/wrote revision 2\. What you typed is still here/)).toBeTruthy();
    expect(field(/What changed, and why/).value).toBe('Collimator exchanged.');
    await userEvent.click(screen.getByRole('button', { name: 'Save revision 3' }));
    await waitFor(() => expect(onDone).toHaveBeenCalled());
    const writes = requests.filter((asked) => asked.method === 'POST');
    expect(writes.map((asked) => asked.headers.get('if-match'))).toEqual(['"3"', '"4"']);
    expect(within(document.body).queryByText('Somebody changed this meanwhile')).toBeNull();
  });
});

import { act, cleanup, configure, fireEvent, screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { forgetDraft } from '@/components/pierce/kept-drafts.ts';
import { RevisionScreen } from '@/components/pierce/revision-screen.tsx';
import type { Revision } from '@/shared/strategies.ts';
import { ids, json, problem, serveWith, show } from '../support/page.tsx';
import { content, grades, machine, nozzle, prediction, revisionOf } from './strategy-fixtures.ts';

// the designer's search runs on the page here, beside other tests
configure({ asyncUtilTimeout: 15_000 });

afterEach(() => {
  cleanup(); // before the server goes: a page that is still there would go on asking
  vi.unstubAllGlobals();
  forgetDraft(ids.user, ids.revision);
});

function serving(revision: Revision, former: readonly Revision[] = []) {
  return serveWith(({ path, method, body }) => {
    if (method === 'PUT') {
      return json({ ...revision, version: 4, content: (body as { content: Revision['content'] }).content }); // the client's own request
    }
    switch (path) {
      case '/api/machines':
        return json({ items: [machine] });
      case '/api/nozzles':
        return json({ items: [nozzle] });
      case '/api/grades':
        return json({ items: grades });
      case `/api/revisions/${revision.id}`:
        return json(revision);
      case `/api/strategies/${revision.strategyId}`:
        return json({
          id: revision.strategyId,
          version: 2,
          name: revision.strategyName,
          revisions: [revision, ...former],
        });
      default:
        return problem('not-found');
    }
  });
}

/** The designer on a phone: one lane at a time, mean power first. */
const open = (revision: Revision = revisionOf(), former: readonly Revision[] = []) => {
  vi.stubGlobal('innerWidth', 390);
  const requests = serving(revision, former);
  return { requests, ...show(<RevisionScreen id={ids.revision} />, 'engineer') };
};
const knot = (name: string) => screen.findByRole('slider', { name });
const words = () => screen.getAllByRole('img', { name: /^Section of/ })[0]?.getAttribute('aria-label');
const button = (name: string) => screen.getByRole<HTMLButtonElement>('button', { name });
const chooseLane = async (name: string) => userEvent.click(await screen.findByRole('radio', { name }));
const startOfOne = 'Standoff at the start of stage 1';
const oneMeetsTwo = 'Standoff where stage 1 meets stage 2';

describe('a knot of the drawing', () => {
  it('goes up and down by keys, a step or with Shift a larger one, and the prediction follows', async () => {
    open();
    const power = await knot('Power where stage 1 meets stage 2');
    const before = words();
    const peak = Number(power.getAttribute('aria-valuenow'));
    power.focus();
    await userEvent.keyboard('{ArrowUp}');
    expect(Number(power.getAttribute('aria-valuenow'))).toBe((Math.floor(peak / 50 + 1e-6) + 1) * 50);
    await userEvent.keyboard('{Shift>}{ArrowUp}{/Shift}');
    expect(Number(power.getAttribute('aria-valuenow'))).toBeGreaterThan(peak + 400);
    expect(words()).not.toBe(before);
    expect(document.body.textContent).not.toMatch(/NaN|Infinity|undefined/);
  });

  it('moves both stages where they meet, and stops at the machine’s limits', async () => {
    open();
    await chooseLane('Standoff');
    const shared = await knot(oneMeetsTwo);
    shared.focus();
    await userEvent.keyboard('{End}');
    const most = machine.revisions[0]?.profile.standoff.max ?? 0;
    expect(Number(shared.getAttribute('aria-valuenow'))).toBe(most);
    await userEvent.keyboard('{ArrowUp}');
    expect(Number(shared.getAttribute('aria-valuenow'))).toBe(most);
    const written = String(most * 1000);
    expect(screen.getByRole<HTMLInputElement>('textbox', { name: 'Standoff at the end of stage 1, mm' }).value).toBe(
      written,
    );
    expect(screen.getByRole<HTMLInputElement>('textbox', { name: 'Standoff at the start of stage 2, mm' }).value).toBe(
      written,
    );
  });

  it('is one of two where stages meet in a step, and then moves its own stage only', async () => {
    const stages = content.stages.map((stage, index) =>
      index === 0 ? { ...stage, to: { ...stage.to, standoff: 0.012 } } : stage,
    );
    open(revisionOf({ content: { ...content, stages } }));
    await chooseLane('Standoff');
    const end = await knot('Standoff at the end of stage 1');
    const next = await knot('Standoff at the start of stage 2');
    const other = next.getAttribute('aria-valuenow');
    end.focus();
    await userEvent.keyboard('{ArrowDown}');
    expect(Number(end.getAttribute('aria-valuenow'))).toBeCloseTo(0.0119);
    expect(next.getAttribute('aria-valuenow')).toBe(other);
  });

  it('gives way to its neighbour with left and right', async () => {
    open();
    await chooseLane('Standoff');
    (await knot(startOfOne)).focus();
    await userEvent.keyboard('{ArrowRight}');
    expect(document.activeElement?.getAttribute('aria-label')).toBe(oneMeetsTwo);
  });

  it('has the dial’s number beside a focus position, in the drawing and beside the field', async () => {
    open();
    await chooseLane('Focus');
    const first = await knot('Focus at the start of stage 1');
    first.focus();
    await userEvent.keyboard('{Home}');
    expect(first.getAttribute('aria-valuetext')).toMatch(/^−\d+(\.\d+)? mm, type \d/);
    expect(screen.getByText(/^Type 10\.0 on the dial\.$/)).toBeTruthy();
  });

  it('is changed without dragging: by less and more, and by a number with its unit that the machine takes', async () => {
    open();
    await chooseLane('Standoff');
    const first = await knot(startOfOne);
    act(() => first.focus());
    const before = Number(first.getAttribute('aria-valuenow'));
    await userEvent.click(button(`Less: ${startOfOne}`));
    expect(Number(first.getAttribute('aria-valuenow'))).toBeCloseTo(before - 0.1e-3, 9);
    const typed = screen.getByRole<HTMLInputElement>('textbox', { name: startOfOne });
    await userEvent.clear(typed);
    await userEvent.type(typed, '90');
    expect(screen.getByText('This machine takes 0.5 to 25 mm.')).toBeTruthy();
    expect(Number(first.getAttribute('aria-valuenow'))).toBeLessThan(0.025);
    await userEvent.clear(typed);
    await userEvent.type(typed, '1/2 in');
    expect(Number(first.getAttribute('aria-valuenow'))).toBeCloseTo(0.0127);
  });
});

describe('a drag', () => {
  const drag = async (element: Element, pixels: { x?: number; y?: number }, let_go = true) => {
    const at = (x: number, y: number) => ({ pointerId: 1, button: 0, clientX: x, clientY: y });
    fireEvent.pointerDown(element, at(100, 300));
    for (const share of [0.25, 0.5, 0.75, 1]) {
      fireEvent.pointerMove(element, at(100 + share * (pixels.x ?? 0), 300 + share * (pixels.y ?? 0)));
      await act(() => new Promise((done) => requestAnimationFrame(() => done(undefined))));
    }
    if (let_go) fireEvent.pointerUp(element, at(100 + (pixels.x ?? 0), 300 + (pixels.y ?? 0)));
  };

  it('shows where it would lead while it lasts, reaches the form when let go, and is one step back', async () => {
    open();
    const first = await knot('Power where stage 1 meets stage 2');
    const field = screen.getByRole<HTMLInputElement>('textbox', { name: 'Peak power at the end of stage 1, kW' });
    const before = field.value;
    const predicted = words();
    await drag(first, { y: -40 }, false);
    const shown = Number(first.getAttribute('aria-valuenow'));
    expect(shown % 100).toBe(0); // hundreds of watts
    expect(shown).toBeGreaterThan(Number(before) * 1000);
    expect(words()).not.toBe(predicted);
    expect(field.value).toBe(before);
    fireEvent.pointerUp(first, { pointerId: 1, button: 0, clientX: 100, clientY: 260 });
    expect(Number(field.value) * 1000).toBeCloseTo(shown);
    await userEvent.click(button('Undo'));
    expect(field.value).toBe(before);
    expect(words()).toBe(predicted);
    expect(button('Undo').disabled).toBe(true);
    await userEvent.click(button('Redo'));
    expect(Number(field.value) * 1000).toBeCloseTo(shown);
  });

  it('that is broken off leaves everything as it was', async () => {
    open();
    await chooseLane('Standoff');
    const first = await knot(startOfOne);
    const before = first.getAttribute('aria-valuenow');
    await drag(first, { y: -40 }, false);
    fireEvent.pointerCancel(first, { pointerId: 1 });
    expect(first.getAttribute('aria-valuenow')).toBe(before);
    expect(button('Undo').disabled).toBe(true);
  });

  it('of a stage’s end makes the stage longer and leaves the others as long as they were', async () => {
    open();
    const end = await knot('Duration of stage 2, on the time axis');
    const lasts = (stage: number) =>
      screen.getByRole<HTMLInputElement>('textbox', { name: `Duration of stage ${stage}, s` }).value;
    const [two, three] = [lasts(2), lasts(3)];
    await drag(end, { x: 60 });
    expect(Number(lasts(2))).toBeGreaterThan(Number(two));
    expect(lasts(3)).toBe(three);
  });
});

describe('steps back and forth', () => {
  it('take back all that was typed into a field at once, by key too', async () => {
    open();
    const hold = await screen.findByRole<HTMLInputElement>('textbox', { name: 'Duration of stage 4, s' });
    const before = hold.value;
    await userEvent.clear(hold);
    await userEvent.type(hold, '20.5');
    await userEvent.tab();
    await userEvent.keyboard('{Control>}z{/Control}');
    expect(hold.value).toBe(before);
    await userEvent.keyboard('{Control>}{Shift>}z{/Shift}{/Control}');
    expect(hold.value).toBe('20.5');
  });

  it('split a stage at its middle so that depth and breakthrough stay as they were', async () => {
    open();
    await userEvent.click(await screen.findByRole('button', { name: 'Add, move or remove at stage 1' }));
    const through = () => words()?.replace(/\d+ stages/, '');
    const before = through();
    await userEvent.click(button('Split stage 1 in two at its middle'));
    expect(screen.getByRole('group', { name: 'Stage 5' })).toBeTruthy();
    expect(through()).toBe(before);
    await userEvent.click(button('Undo'));
    expect(screen.queryByRole('group', { name: 'Stage 5' })).toBeNull();
  });
});

describe('a duplicated stage', () => {
  it('holds the same numbers right after the first, makes the routine longer by its time, and is one step back', async () => {
    open();
    await userEvent.click(await screen.findByRole('button', { name: 'Add, move or remove at stage 2' }));
    const written = (name: string) => screen.getByRole<HTMLInputElement>('textbox', { name }).value;
    const routine = () => Number(/over ([\d.]+) s/.exec(words() ?? '')?.[1]);
    const before = routine();
    const lasts = Number(written('Duration of stage 2, s'));
    await userEvent.click(button('Duplicate stage 2'));
    expect(screen.getAllByRole('group', { name: /^Stage \d$/ })).toHaveLength(content.stages.length + 1);
    for (const number of [
      'Duration of stage #, s',
      'Standoff at the start of stage #, mm',
      'Peak power at the end of stage #, kW',
    ])
      expect(written(number.replace('#', '3'))).toBe(written(number.replace('#', '2')));
    expect(routine()).toBeCloseTo(before + lasts, 1);
    await userEvent.click(button('Undo'));
    expect(screen.getAllByRole('group', { name: /^Stage \d$/ })).toHaveLength(content.stages.length);
  });
});

describe('the comparison with the revision before', () => {
  it('draws it in dots with its name, and says the difference in words', async () => {
    const former = revisionOf({ id: ids.other, number: 3, state: 'approved' });
    const stages = content.stages.map((stage, index) =>
      index === 3 ? { ...stage, duration: stage.duration + 2 } : stage,
    );
    open(revisionOf({ content: { ...content, stages } }), [former, revisionOf({ id: ids.report, number: 2 })]);
    const tick = await screen.findByRole('checkbox', { name: 'Compare with revision 3' });
    expect(screen.queryByTestId('section-ghost')).toBeNull();
    await userEvent.click(tick);
    expect(screen.getByTestId('section-ghost').textContent).toBe('revision 3');
    expect(screen.getAllByTestId('lane-ghost')).toHaveLength(1);
    await screen.findByText(
      /Against revision 3: On a cold plate through at the same moment, reserve 2\.\d\d instead of/,
    );
    expect(screen.getByText(/The routine is 2 s longer/)).toBeTruthy();
  });

  it('is not offered for the first revision', async () => {
    open();
    await knot('Power where stage 1 meets stage 2');
    expect(screen.queryByRole('checkbox', { name: /Compare/ })).toBeNull();
  });
});

describe('a result', () => {
  it('tells what it is, how it is worked out, from which numbers and assumptions, and where they come from', async () => {
    open();
    await userEvent.click(await screen.findByRole('button', { name: /^reserve, cold: 2\.\d\d\. How/ }));
    const sheet = await screen.findByRole('dialog', { name: 'Reserve on a cold plate' });
    expect(within(sheet).getByText(/Routine time divided by the time to breakthrough/)).toBeTruthy();
    expect(within(sheet).getByText('22 mm')).toBeTruthy();
    expect(within(sheet).getByText('20 °C')).toBeTruthy();
    expect(within(sheet).getByText(/absorbed at its bottom while shallow\. Origin: own estimate/)).toBeTruthy();
    expect(within(sheet).getByText(/Model pierce-/)).toBeTruthy();
    await userEvent.click(within(sheet).getByRole('button', { name: 'Close' }));
    await waitFor(() => expect(screen.queryByRole('dialog', { name: 'Reserve on a cold plate' })).toBeNull());
  });

  it('of each kind opens its sheet', async () => {
    open();
    const titles = {
      'through, cold': 'Through on a cold plate',
      'through, hot': 'Through on the hottest plate',
      routine: 'Routine',
      'reserve, hot': 'Reserve on the hottest plate',
      'crater radius': 'Crater radius',
      eruption: 'Eruption',
      'laser energy': 'Laser energy',
      'oxygen used': 'Oxygen used',
      'mean power': 'Mean power',
      'peak power': 'Peak power',
      pulses: 'Pulses',
      'heat left': 'Heat left in the plate',
      'lead-in from': 'Shortest lead-in',
      'Stage 1: .* deep at its end': 'Depth at the end of stage 1',
      'Stage 1: .* of an eruption': 'Eruption in stage 1',
    };
    await knot('Power where stage 1 meets stage 2');
    for (const [name, title] of Object.entries(titles)) {
      fireEvent.click(screen.getByRole('button', { name: new RegExp(`^${name}[:.] .*How it is worked out`) }));
      const sheet = await screen.findByRole('dialog', { name: title });
      for (const heading of ['How it is worked out', 'From these numbers', 'Source'])
        expect(within(sheet).getByText(heading)).toBeTruthy();
      expect(sheet.textContent).not.toMatch(/NaN|Infinity|undefined|null|not kept/);
      fireEvent.click(within(sheet).getByText('Close'));
      await waitFor(() => expect(screen.queryByText(title, { selector: 'dialog *' })).toBeNull());
    }
  });
});

describe('a stage in which the bottom stands still', () => {
  it('says from when, and why: a flat power stalls, and the sheet names what is conducted away', async () => {
    const [first] = content.stages;
    if (!first) throw new Error('the draft has a stage');
    const weak = { ...first.from, peakPower: 1500, duty: 0.4 };
    open(revisionOf({ content: { ...content, stages: [{ duration: 30, from: weak, to: { ...weak } }] } }));
    fireEvent.click(await screen.findByRole('button', { name: /^Stage 1: Stands still from [\d.]+ s\. How/ }));
    const sheet = await screen.findByRole('dialog', { name: 'Standing still in stage 1' });
    expect(within(sheet).getByText(/The bottom stands still at [\d.]+ mm: of 59\d W mean power/)).toBeTruthy();
    expect(within(sheet).getByText('at a depth of')).toBeTruthy();
  });
});

describe('a revision predicted before pulses and heat were kept', () => {
  it('says so where they would stand, and shows all the rest', async () => {
    const former = { ...prediction, pulses: null, heatLeft: null, heatPerThickness: null, eruptions: null };
    open(revisionOf({ state: 'approved', prediction: former }));
    fireEvent.click(await screen.findByRole('button', { name: 'heat left: not kept. How it is worked out' }));
    const sheet = await screen.findByRole('dialog', { name: 'Heat left in the plate' });
    expect(sheet.textContent).not.toMatch(/NaN|undefined|null/);
    expect(screen.getByRole('button', { name: /^through, cold: [\d.]+ s/ })).toBeTruthy();
  });
});

// the search itself is half a second on an idle core
describe('the designer’s proposal', { timeout: 60_000 }, () => {
  const propose = async () => {
    await userEvent.click(await screen.findByRole('button', { name: 'Propose' }));
    return screen.findByRole('button', { name: 'Work it out' });
  };

  it('is drawn behind the draft, compared in numbers, and taken as one step', async () => {
    open();
    await userEvent.click(await propose());
    expect(await screen.findByText(/^Proposed: \d stages over/)).toBeTruthy();
    expect(screen.getByTestId('section-ghost').textContent).toBe('proposal');
    expect(screen.getByText(/Against yours: On a cold plate/)).toBeTruthy();
    const before = words();
    await userEvent.click(button('Accept the proposal'));
    expect(words()).not.toBe(before);
    expect(screen.queryByTestId('section-ghost')).toBeNull();
    await userEvent.click(button('Undo'));
    expect(words()).toBe(before);
    expect(button('Undo').disabled).toBe(true);
  });

  it('is not made when the search is stopped, and the draft stays as it was', async () => {
    open();
    const begin = await propose();
    const before = words();
    fireEvent.click(begin);
    expect(screen.getByRole('progressbar', { name: 'Trying routines' })).toBeTruthy();
    fireEvent.click(button('Cancel'));
    expect(screen.queryByRole('progressbar')).toBeNull();
    // long enough for an answer that was on its way all the same
    await act(() => new Promise((later) => setTimeout(later, 1500)));
    expect(screen.queryByTestId('section-ghost')).toBeNull();
    expect(screen.getByRole('button', { name: 'Work it out' })).toBeTruthy();
    expect(words()).toBe(before);
  });

  it('keeps the stages that are ticked as they are', async () => {
    const { requests } = open();
    const begin = await propose();
    await userEvent.click(screen.getByRole('checkbox', { name: /^Stage 1/ }));
    await userEvent.click(begin);
    await screen.findByText(/^(Proposed: 4 stages|No routine keeps)/);
    await userEvent.click(screen.getByRole('button', { name: /^(Accept the proposal|Take the nearest)/ }));
    await userEvent.click(button('Save'));
    await screen.findByText('Saved.');
    const put = requests.find(({ method }) => method === 'PUT')?.body as { content: Revision['content'] }; // the client's own request
    expect(put.content.stages[0]).toEqual(content.stages[0]);
    expect(put.content.stages).toHaveLength(4);
  });

  it('that can’t be made says which limit is in the way and what would have to give', async () => {
    open();
    const begin = await propose();
    await userEvent.click(button('Further limits'));
    await userEvent.type(screen.getByRole('textbox', { name: /^Longest routine/ }), '1');
    await userEvent.click(begin);
    expect(await screen.findByText('No routine keeps all of that')).toBeTruthy();
    expect(screen.getByText(/The routine would have to be allowed|giving way in one limit is not enough/)).toBeTruthy();
    expect(screen.getByTestId('section-ghost').textContent).toBe('nearest');
    await userEvent.click(button('Dismiss'));
    expect(screen.queryByTestId('section-ghost')).toBeNull();
  });

  it('is not asked for with a reserve that can’t be, and says the range', async () => {
    open();
    const begin = await propose();
    const cold = screen.getByRole('textbox', { name: 'Reserve on a cold plate, at least' });
    await userEvent.clear(cold);
    await userEvent.type(cold, '0.4');
    expect(screen.getByText('Give a number from 1 to 20.')).toBeTruthy();
    expect((begin as HTMLButtonElement).disabled).toBe(true); // it is a button
  });
});

describe('what the hall does to the reserve', () => {
  it('is said for a dirty and a clean plate, a worn nozzle, 2 mm more and the hottest plate', async () => {
    open();
    const list = await screen.findByRole('list', { name: 'What the hall does to the reserve' });
    const rows = within(list).getAllByRole('listitem');
    expect(rows).toHaveLength(6);
    expect(rows[0]?.textContent).toMatch(/As set.*reserve 2\.\d\d/);
    expect(list.textContent).toMatch(/2 mm thicker: reserve \d\.\d\d, −\d\.\d\d/);
  });
});

describe('a revision in review', () => {
  it('shows its knots and results but lets nothing be moved', async () => {
    open(revisionOf({ state: 'inReview', prediction }));
    expect(await screen.findAllByTestId('lane-knot')).toHaveLength(content.stages.length + 1);
    expect(screen.queryByRole('slider')).toBeNull();
    expect(screen.queryByRole('button', { name: 'Propose' })).toBeNull();
  });
});

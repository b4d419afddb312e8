import { screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { forgetDraft } from '@/components/pierce/kept-drafts.ts';
import { RevisionScreen } from '@/components/pierce/revision-screen.tsx';
import type { Revision } from '@/shared/strategies.ts';
import { ids, json, problem, serveWith, show, type Answer, type Asked } from '../support/page.tsx';
import { grades, machine, nozzle, revisionOf } from './strategy-fixtures.ts';

afterEach(() => {
  vi.unstubAllGlobals();
  forgetDraft(ids.user, ids.revision);
});

/** A server that holds one revision; `other` answers what a test wants answered otherwise. */
function serving(revision: Revision, other: (asked: Asked) => Answer | null = () => null) {
  return serveWith((asked) => {
    const given = other(asked);
    if (given) return given;
    switch (asked.path) {
      case '/api/machines':
        return json({ items: [machine] });
      case '/api/nozzles':
        return json({ items: [nozzle] });
      case '/api/grades':
        return json({ items: grades });
      case `/api/revisions/${revision.id}`:
        return json(revision);
      case `/api/strategies/${revision.strategyId}`:
        return json({ id: revision.strategyId, version: 2, name: revision.strategyName, revisions: [revision] });
      default:
        return problem('not-found');
    }
  });
}

const field = (name: string) => screen.findByRole<HTMLInputElement>('textbox', { name });
const words = () => screen.getAllByRole('img', { name: /^Section of/ })[0]?.getAttribute('aria-label');
const retype = async (input: HTMLInputElement, text: string) => {
  await userEvent.clear(input);
  await userEvent.type(input, text);
};

describe('the pierce designer', () => {
  it('predicts anew while a number is typed', async () => {
    serving(revisionOf());
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    const hold = await field('Duration of stage 4, s');
    await waitFor(() => expect(words()).toMatch(/reserve 2\.30/));
    const before = words();
    await retype(hold, '20');
    await waitFor(() => expect(words()).not.toBe(before));
    expect(words()).toMatch(/reserve 3\.\d\d/);
    expect(screen.getByText(/Changes are not saved yet/)).toBeTruthy();
  });

  it('keeps a text that is no number, says the range beside it, and lets the prediction stand', async () => {
    serving(revisionOf());
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    const standoff = await field('Standoff at the start of stage 1, mm');
    const before = words();
    await retype(standoff, 'ten');
    expect(standoff.value).toBe('ten');
    expect(await screen.findByText('Give a number: 0.1 to 50 mm.')).toBeTruthy();
    expect(words()).toBe(before);
    expect(screen.getByText(/The prediction stands at the last numbers/)).toBeTruthy();
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Save' }).disabled).toBe(true);
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Submit for review' }).disabled).toBe(true);
    expect(document.body.textContent).not.toContain('NaN');
  });

  it('says the range of a number outside it, and takes inches where millimetres are usual', async () => {
    serving(revisionOf());
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    await retype(await field('Duration of stage 2, s'), '900');
    expect(await screen.findByText('Must be within 0.001 to 600 s.')).toBeTruthy();
    await retype(await field('Standoff in stage 4, mm'), '1/4 in');
    expect(await screen.findByText(/6\.35 mm/)).toBeTruthy();
  });

  it('shows the number to type on a reversed dial beside the focus position', async () => {
    serving(revisionOf());
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    const stage = await screen.findByRole('group', { name: 'Stage 1' });
    await waitFor(() => expect(stage.textContent).toContain('type −2.27 on the dial'));
    await retype(within(stage).getByRole('textbox', { name: 'Focus in stage 1, mm' }), '2,2');
    await waitFor(() => expect(stage.textContent).toContain('type −1.0 on the dial'));
  });

  it('takes the next stage along when a ramp’s end moves, as one knot', async () => {
    serving(revisionOf());
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    await retype(await field('Standoff at the end of stage 1, mm'), '7');
    expect((await field('Standoff at the start of stage 2, mm')).value).toBe('7');
  });

  it('adds, moves and removes stages, and a text that is no number goes with its own stage', async () => {
    serving(revisionOf());
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    await retype(await field('Duration of stage 1, s'), 'soon');
    await userEvent.click(screen.getByRole('button', { name: 'Add, move or remove at stage 1' }));
    await userEvent.click(screen.getByRole('button', { name: 'Move stage 1 later' }));
    expect((await field('Duration of stage 2, s')).value).toBe('soon');
    await userEvent.click(screen.getByRole('button', { name: 'Remove stage 2' }));
    expect(screen.queryByRole('group', { name: 'Stage 4' })).toBeNull();
    expect(screen.queryByText(/Give a number/)).toBeNull();
  });

  it('saves what was typed from the version it was made from', async () => {
    const requests = serving(revisionOf(), ({ method, body }) =>
      method === 'PUT'
        ? json(revisionOf({ version: 4, content: (body as { content: Revision['content'] }).content })) // the client's own request
        : null,
    );
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    await retype(await field('Duration of stage 4, s'), '20');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText('Saved.')).toBeTruthy();
    const put = requests.find(({ method }) => method === 'PUT');
    expect(put?.headers.get('if-match')).toBe('"3"');
    expect((put?.body as { content: Revision['content'] }).content.stages[3]?.duration).toBe(20); // likewise
    expect(screen.queryByText(/not saved yet/)).toBeNull();
  });

  it('keeps what was typed when somebody else saved first, and saves it over theirs only when told to', async () => {
    let saves = 0;
    const theirs = revisionOf({ version: 9 });
    const requests = serving(revisionOf(), ({ method, path, body }) => {
      if (method === 'PUT') {
        saves += 1;
        return saves === 1
          ? problem('stale')
          : json({ ...theirs, version: 10, content: (body as { content: Revision['content'] }).content }); // the client's own request
      }
      return saves > 0 && path === `/api/revisions/${ids.revision}` ? json(theirs) : null;
    });
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    await retype(await field('Duration of stage 4, s'), '20');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText('Somebody changed this draft meanwhile')).toBeTruthy();
    expect((await field('Duration of stage 4, s')).value).toBe('20');
    await userEvent.click(screen.getByRole('button', { name: 'Save mine over theirs' }));
    await screen.findByText('Saved.');
    expect(requests.filter(({ method }) => method === 'PUT').map(({ headers }) => headers.get('if-match'))).toEqual([
      '"3"',
      '"9"',
    ]);
  });

  it('finds unsaved changes again after looking at something else', async () => {
    serving(revisionOf());
    const first = show(<RevisionScreen id={ids.revision} />, 'engineer');
    await retype(await field('Duration of stage 3, s'), '4,5');
    first.unmount();
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    expect((await field('Duration of stage 3, s')).value).toBe('4.5');
    expect(screen.getByText(/did not save are still here/)).toBeTruthy();
    await userEvent.click(screen.getByRole('button', { name: 'Drop changes' }));
    await userEvent.click(within(await screen.findByRole('dialog')).getByRole('button', { name: 'Drop changes' }));
    expect((await field('Duration of stage 3, s')).value).not.toBe('4.5');
  });
});

describe('a revision in review', () => {
  const inReview = (touchedBy: Revision['touchedBy']) => revisionOf({ state: 'inReview', touchedBy });

  it('can’t be edited, and tells who wrote in it that a second person must decide', async () => {
    serving(inReview([{ id: ids.user, name: 'Lead' }]));
    show(<RevisionScreen id={ids.revision} />, 'lead');
    expect(await screen.findByText('You wrote part of this revision. A second person must decide.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Approve' })).toBeNull();
    expect(screen.queryByRole('textbox')).toBeNull();
    expect(screen.queryByRole('button', { name: 'Save' })).toBeNull();
  });

  it('is approved as it was seen by a lead who did not touch it', async () => {
    const requests = serving(inReview([{ id: ids.other, name: 'Engineer' }]), ({ path }) =>
      path.endsWith('/approve') ? json(revisionOf({ state: 'approved', version: 4 })) : null,
    );
    show(<RevisionScreen id={ids.revision} />, 'lead');
    await userEvent.click(await screen.findByRole('button', { name: 'Approve' }));
    await userEvent.click(within(await screen.findByRole('dialog')).getByRole('button', { name: 'Approve' }));
    await waitFor(() => expect(requests.some(({ path }) => path.endsWith('/approve'))).toBe(true));
    expect(requests.find(({ path }) => path.endsWith('/approve'))?.headers.get('if-match')).toBe('"3"');
  });

  it('is not returned without saying what must change, and words survive a refusal', async () => {
    serving(inReview([]), ({ path }) => (path.endsWith('/return') ? problem('wrong-state', 'It was approved.') : null));
    show(<RevisionScreen id={ids.revision} />, 'lead');
    await userEvent.click(await screen.findByRole('button', { name: 'Return' }));
    const dialog = await screen.findByRole('dialog');
    await userEvent.click(within(dialog).getByRole('button', { name: 'Return' }));
    expect(within(dialog).getByText('Say what must change.')).toBeTruthy();
    const text = within(dialog).getByRole<HTMLTextAreaElement>('textbox');
    await userEvent.type(text, 'The reserve is thin.');
    await userEvent.click(within(dialog).getByRole('button', { name: 'Return' }));
    expect(await within(dialog).findByText(/It was approved/)).toBeTruthy();
    expect(text.value).toBe('The reserve is thin.');
  });
});

import { screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { HouseRuleList } from '@/components/rules/house-rule-list.tsx';
import { LiveHouseRules } from '@/components/rules/live-house-rules.tsx';
import { HouseRulesScreen } from '@/components/rules/house-rules-screen.tsx';
import { placesOf } from '@/components/shell/places.ts';
import type { HouseRule, HouseRuleExample, HouseRuleVerdict } from '@/shared/house-rules.ts';
import { houseRuleTable } from '@/strategy/rules/names.ts';
import { content } from './strategy-fixtures.ts';
import { ids, json, offline, problem, serveWith, show, type Answer, type Asked } from '../support/page.tsx';

afterEach(() => vi.unstubAllGlobals());

const lead = { id: ids.user, name: 'Lead' };
const ruleOf = (more: Partial<HouseRule> = {}): HouseRule => ({
  id: ids.other,
  version: 2,
  expression: 'craterRadius <= 1.5 mm',
  sentence: 'The crater stays within 1.5 mm.',
  blocks: true,
  endedAt: null,
  changedAt: '2031-03-01T09:00:00Z',
  changedBy: lead,
  ...more,
});
const example: HouseRuleExample = {
  revisionId: ids.revision,
  strategyName: 'Bearing plate',
  number: 4,
  results: houseRuleTable.map(({ name }) => ({ name, value: name === 'craterRadius' ? 0.0012 : null })),
};

/** A server with these rules; `other` answers what a test wants answered otherwise. */
const serving = (rules: readonly HouseRule[], other: (asked: Asked) => Answer | null = () => null) =>
  serveWith((asked) => {
    const given = other(asked);
    if (given) return given;
    if (asked.path === '/api/house-rules/example') return json({ example });
    if (asked.path === '/api/house-rules/read') {
      const { expression } = asked.body as { expression: string }; // the client's own request
      return json(
        expression.includes('<=') || expression.includes('>=')
          ? { kind: 'ok', uses: ['craterRadius'], example: { state: 'broken', why: 'Here craterRadius is 1.2 mm.' } }
          : { kind: 'none', why: 'This is a length and no comparison: what must it be at least or at most?' },
      );
    }
    return json({ items: rules });
  });

const button = (name: string | RegExp) => screen.findByRole('button', { name });
const field = (name: string) => screen.findByRole<HTMLInputElement>('textbox', { name });

describe('the list of house rules', () => {
  it('says that it is being fetched', async () => {
    serveWith(() => new Promise<Response>(() => undefined));
    show(<HouseRulesScreen />);
    expect(await screen.findByText('Fetching the house rules')).toBeTruthy();
  });

  it('says what would stand here when there is none', async () => {
    serving([]);
    show(<HouseRulesScreen />);
    expect(await screen.findByText('No house rule yet')).toBeTruthy();
  });

  it('says that the connection is lost, and fetches again when asked to', async () => {
    let up = false;
    serveWith(() => (up ? json({ items: [ruleOf()] }) : offline()));
    show(<HouseRulesScreen />);
    expect(await screen.findByText('No connection')).toBeTruthy();
    up = true;
    await userEvent.click(await button('Try again'));
    expect(await screen.findByText('The crater stays within 1.5 mm.')).toBeTruthy();
  });

  it('shows each with its expression, whether it blocks, and who wrote it; ended ones apart', async () => {
    serving([
      ruleOf(),
      ruleOf({ id: ids.plant, expression: 'reserveCold >= 2', sentence: 'Twice.', blocks: false, changedBy: null }),
      ruleOf({ id: ids.plate, sentence: 'No stalls.', endedAt: '2031-03-02T09:00:00Z' }),
    ]);
    show(<HouseRulesScreen />);
    const inForce = await screen.findByRole('list', { name: 'Rules in force' });
    expect(within(inForce).getByText('craterRadius <= 1.5 mm')).toBeTruthy();
    expect(within(inForce).getByText('A draft that does not keep it can’t be handed in.')).toBeTruthy();
    expect(within(inForce).getByText(/version 2, Lead/)).toBeTruthy();
    expect(within(inForce).getByText('there from the start')).toBeTruthy();
    expect(within(inForce).queryByText('No stalls.')).toBeNull();
    const ended = screen.getByRole('list', { name: 'Rules that ended' });
    expect(within(ended).getByText('No stalls.')).toBeTruthy();
    expect(within(ended).queryByRole('button')).toBeNull();
  });

  it('is a page of the lead’s alone', () => {
    const paths = (role: 'lead' | 'engineer') =>
      placesOf({ userId: ids.user, plantId: ids.plant, role, mayApprove: true }).map(({ path }) => path);
    expect(paths('lead')).toContain('/house-rules');
    expect(paths('engineer')).not.toContain('/house-rules');
  });
});

describe('writing a rule', () => {
  const begin = async () => {
    show(<HouseRulesScreen />);
    await screen.findByText('The crater stays within 1.5 mm.');
    await userEvent.click(await button('Add a rule'));
  };

  it('shows each name with meaning, how a limit is written, and its value on a revision of the plant', async () => {
    serving([ruleOf()]);
    await begin();
    expect(await screen.findByText('Values are those of “Bearing plate”, revision 4.')).toBeTruthy();
    const names = screen.getByRole('list', { name: 'Names a rule may use' });
    expect(within(names).getAllByRole('button')).toHaveLength(houseRuleTable.length);
    const crater = within(names).getByRole('button', { name: 'Put craterRadius into the rule' }).closest('li');
    expect(crater?.textContent).toContain('1.2 mm');
    expect(crater?.textContent).toContain('as in craterRadius <= 1.5 mm');
    expect(names.textContent).not.toMatch(/NaN|null|undefined/);
  });

  it('keeps the names folded on a phone until they are asked for', async () => {
    const usualWidth = window.innerWidth;
    window.innerWidth = 390;
    try {
      serving([ruleOf()]);
      await begin();
      expect(screen.queryByRole('list', { name: 'Names a rule may use' })).toBeNull();
      await userEvent.click(await button('Names a rule may use'));
      expect(screen.getByRole('list', { name: 'Names a rule may use' })).toBeTruthy();
    } finally {
      window.innerWidth = usualWidth;
    }
  });

  it('says as one types whether it is a rule, and what it says of the revision changed last', async () => {
    serving([ruleOf()]);
    await begin();
    await userEvent.click(await button('Put craterRadius into the rule'));
    expect((await field('Rule')).value).toBe('craterRadius ');
    expect(document.activeElement).toBe(await field('Rule'));
    expect(await screen.findByText(/a length and no comparison/)).toBeTruthy();
    await userEvent.type(await field('Rule'), '<= 1 mm');
    expect(
      await screen.findByText(
        /This is a rule\. On the revision changed last: it is not kept\. Here craterRadius is 1\.2 mm\./,
      ),
    ).toBeTruthy();
  });

  it('says at each field what is missing when it is sent empty', async () => {
    const requests = serving([ruleOf()]);
    await begin();
    const form = screen.getByRole('form', { name: 'Add a rule' });
    await userEvent.click(within(form).getByRole('button', { name: 'Add a rule' }));
    expect(await screen.findByText('Write the rule, as in reserveHot >= 2.')).toBeTruthy();
    expect(screen.getByText('Say in a sentence what the rule asks for.')).toBeTruthy();
    expect((await field('Rule')).getAttribute('aria-invalid')).toBe('true');
    expect(requests.some(({ path, method }) => path === '/api/house-rules' && method === 'POST')).toBe(false);
  });

  it('sends it, and is back at the list', async () => {
    const requests = serving([ruleOf()], ({ method, path, body }) =>
      method === 'POST' && path === '/api/house-rules' ? json({ ...ruleOf(), ...(body as object) }, 201) : null,
    );
    await begin();
    await userEvent.type(await field('Rule'), 'reserveHot >= 2.5');
    await userEvent.type(await field('In a sentence'), 'Two and a half.');
    await userEvent.click(screen.getByLabelText(/Must be kept before/));
    const form = screen.getByRole('form', { name: 'Add a rule' });
    await userEvent.click(within(form).getByRole('button', { name: 'Add a rule' }));
    await waitFor(() => expect(screen.queryByRole('form', { name: 'Add a rule' })).toBeNull());
    const post = requests.find(({ path, method }) => path === '/api/house-rules' && method === 'POST');
    expect(post?.body).toMatchObject({ expression: 'reserveHot >= 2.5', sentence: 'Two and a half.', blocks: true });
    expect(post?.headers.get('idempotency-key')).toBeTruthy();
  });

  it('puts the server’s refusal on the expression, keeps the text, and takes it away when it is changed', async () => {
    const why = 'The two sides do not fit: a length and a plain number. Is a unit missing or wrong?';
    serving([ruleOf()], ({ method, path }) =>
      method === 'POST' && path === '/api/house-rules'
        ? problem('invalid-fields', why, [{ pointer: '/expression', detail: why }])
        : null,
    );
    await begin();
    await userEvent.type(await field('Rule'), 'craterRadius <= 1.5');
    await userEvent.type(await field('In a sentence'), 'Small.');
    const form = screen.getByRole('form', { name: 'Add a rule' });
    await userEvent.click(within(form).getByRole('button', { name: 'Add a rule' }));
    await waitFor(async () => expect((await field('Rule')).getAttribute('aria-invalid')).toBe('true'));
    expect(screen.getAllByText(why).length).toBeGreaterThan(0);
    expect((await field('Rule')).value).toBe('craterRadius <= 1.5');
    await userEvent.type(await field('Rule'), ' mm');
    await waitFor(async () => expect((await field('Rule')).getAttribute('aria-invalid')).toBe('false'));
  });
});

describe('changing a rule', () => {
  it('is from the version that was seen when the writing began, also after the list was fetched again', async () => {
    let version = 2;
    const requests = serving([], ({ method, path }) => {
      if (path === '/api/house-rules') return json({ items: [ruleOf({ version })] });
      return method === 'PUT' ? problem('stale') : null;
    });
    const { client } = show(<HouseRulesScreen />);
    await userEvent.click(await button('Change the rule: The crater stays within 1.5 mm.'));
    version = 3;
    await client.invalidateQueries();
    expect(await screen.findByText(/version 3, Lead/)).toBeTruthy();
    await userEvent.clear(await field('In a sentence'));
    await userEvent.type(await field('In a sentence'), 'Mine.');
    await userEvent.click(await button('Save as its next version'));
    expect(await screen.findByText('Somebody changed this meanwhile')).toBeTruthy();
    const puts = () => requests.filter(({ method }) => method === 'PUT');
    expect(puts()[0]?.headers.get('if-match')).toBe('"2"');
    await userEvent.click(await button('Load the newest'));
    await waitFor(() => expect(screen.queryByText('Somebody changed this meanwhile')).toBeNull());
    expect((await field('In a sentence')).value).toBe('Mine.');
    await userEvent.click(await button('Save as its next version'));
    await waitFor(() => expect(puts()[1]?.headers.get('if-match')).toBe('"3"'));
    expect(puts()[1]?.body).toEqual({ expression: 'craterRadius <= 1.5 mm', sentence: 'Mine.', blocks: true });
  });
});

describe('ending a rule', () => {
  it('asks once more', async () => {
    const requests = serving([ruleOf()], ({ method, path }) =>
      method === 'POST' && path.endsWith('/end') ? json(ruleOf({ version: 3, endedAt: '2031-03-02T09:00:00Z' })) : null,
    );
    show(<HouseRulesScreen />);
    await userEvent.click(await button('End the rule: The crater stays within 1.5 mm.'));
    expect(await screen.findByText('End this rule?')).toBeTruthy();
    expect(requests.some(({ method }) => method === 'POST')).toBe(false);
    await userEvent.click(await button('End the rule'));
    await waitFor(() => expect(screen.queryByText('End this rule?')).toBeNull());
    const post = requests.find(({ method }) => method === 'POST');
    expect(post?.path).toBe(`/api/house-rules/${ids.other}/end`);
    expect(post?.headers.get('if-match')).toBe('"2"');
  });
});

describe('what the rules say of a revision', () => {
  const verdict = (more: Partial<HouseRuleVerdict> = {}): HouseRuleVerdict => ({
    ruleId: ids.other,
    expression: 'reserveCold >= 2',
    sentence: 'Twice on a cold plate.',
    blocks: false,
    state: 'holds',
    why: 'Here reserveCold is 2.3.',
    ...more,
  });
  const broken = verdict({ ruleId: ids.plate, sentence: 'Few stages.', state: 'broken', why: 'Here stageCount is 9.' });
  const inTheWay = verdict({
    ruleId: ids.grade,
    sentence: 'Twice on a hot plate.',
    state: 'unclear',
    blocks: true,
    why: 'There is no reserveHot here.',
  });

  it('has what is in the way first, then what is not kept, and the rest when asked for', async () => {
    show(<HouseRuleList verdicts={[verdict(), broken, inTheWay]} />);
    const order = () => screen.getAllByText(/^(Twice|Few)/).map(({ textContent }) => textContent);
    expect(order()).toEqual(['Twice on a hot plate.', 'Few stages.']);
    expect(screen.getByText('It can’t be handed in before this is kept.')).toBeTruthy();
    expect(screen.getByText('Can’t be told: reserveCold >= 2. There is no reserveHot here.')).toBeTruthy();
    expect(screen.getAllByRole('img').map((sign) => sign.getAttribute('aria-label'))).toEqual([
      'Can’t be told',
      'Not kept',
    ]);
    await userEvent.click(screen.getByRole('button', { name: 'Show the one that is kept' }));
    expect(order()).toEqual(['Twice on a hot plate.', 'Few stages.', 'Twice on a cold plate.']);
  });

  it('is one line when all are kept, and says when there are none', () => {
    const first = show(<HouseRuleList verdicts={[verdict(), verdict({ ruleId: ids.plate })]} />);
    expect(screen.getByText('All 2 house rules are kept.')).toBeTruthy();
    first.unmount();
    show(<HouseRuleList verdicts={[]} />);
    expect(screen.getByText('No house rule was asked of it.')).toBeTruthy();
  });

  it('says when it is not of the numbers on the screen', () => {
    show(<HouseRuleList verdicts={[broken]} behind />);
    expect(screen.getByText(/not of those on the screen/)).toBeTruthy();
  });

  it('is asked anew of numbers that are not saved, once one pauses', async () => {
    const requests = serveWith(() => json({ items: [verdict(), broken] }));
    const live = (longer: number, dirty: boolean, sound = true) => (
      <LiveHouseRules
        revision={{ houseRules: [verdict()] }}
        content={{
          ...content,
          stages: content.stages.map((stage) => ({ ...stage, duration: stage.duration + longer })),
        }}
        dirty={dirty}
        sound={sound}
      />
    );
    const first = show(live(0, false));
    expect(screen.getByText('The one house rule is kept.')).toBeTruthy();
    expect(requests).toHaveLength(0);
    first.unmount();
    show(live(1, true));
    expect(await screen.findByText('Few stages.')).toBeTruthy();
    expect(requests.map(({ method, path }) => `${method} ${path}`)).toEqual(['POST /api/revisions/judge']);
  });

  it('stays and says so while a number can’t be read', () => {
    const requests = serveWith(() => offline());
    show(<LiveHouseRules revision={{ houseRules: [verdict()] }} content={content} dirty sound={false} />);
    expect(screen.getByText('The one house rule is kept.')).toBeTruthy();
    expect(screen.getByText(/not of those on the screen/)).toBeTruthy();
    expect(requests).toHaveLength(0);
  });
});

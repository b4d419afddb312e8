import type pg from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { recordEndpoints } from '../../shared/record.ts';
import { connected } from '../support/database.ts';
import { made, makeApproved, makeDraft, makePlant, makeSubmitted, type TestPlant } from '../support/plant.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'guards');
});
afterAll(() => server.close());

describe('a revision', () => {
  test('that was handed in keeps its content, whoever writes', async () => {
    const submitted = await makeSubmitted(plant, { gradeGroup: 'handed in' });
    for (const url of [server.database.appUrl, server.database.ownerUrl]) {
      await expect(
        inPlant(url, (client) =>
          client.query(
            `update strategy_revisions set content = content || '{"hottestPlate": 500}', hottest_plate = 500 where id = $1`,
            [submitted.id],
          ),
        ),
      ).rejects.toThrow('content never changes once handed in');
    }
  });

  test('does not change its content while it is being handed in', async () => {
    const draft = await makeDraft(plant);
    await expect(
      inPlant(server.database.appUrl, (client) =>
        client.query(
          `update strategy_revisions set state = 'inReview', content = content || '{"hottestPlate": 500}', hottest_plate = 500 where id = $1`,
          [draft.id],
        ),
      ),
    ).rejects.toThrow('content never changes once handed in');
  });

  test('that was handed in cannot be deleted, not by the owner either; a draft can', async () => {
    const submitted = await makeSubmitted(plant);
    await expect(
      inPlant(server.database.ownerUrl, (client) =>
        client.query('delete from strategy_revisions where id = $1', [submitted.id]),
      ),
    ).rejects.toThrow('a revision that was handed in is kept');
    const draft = await makeDraft(plant);
    const gone = await inPlant(server.database.ownerUrl, async (client) => {
      // Its authors are kept by a trigger of their own, which is not what is looked at here.
      await client.query('alter table revision_authors disable trigger user');
      await client.query('delete from revision_authors where revision_id = $1', [draft.id]);
      return client.query('delete from strategy_revisions where id = $1', [draft.id]);
    });
    expect(gone.rowCount).toBe(1);
  });

  test('holds columns and content together', async () => {
    const draft = await makeDraft(plant);
    await expect(
      inPlant(server.database.appUrl, (client) =>
        client.query('update strategy_revisions set thickness_max = 25000 where id = $1', [draft.id]),
      ),
    ).rejects.toThrow('strategy_revisions_columns_are_content');
    await expect(
      inPlant(server.database.appUrl, (client) =>
        client.query(`update strategy_revisions set content = content - 'gradeGroup' where id = $1`, [draft.id]),
      ),
    ).rejects.toThrow('strategy_revisions_columns_are_content');
  });

  test('goes one way through its states', async () => {
    const allowed = new Set([
      'draft inReview',
      'inReview approved',
      'inReview returned',
      'approved superseded',
      'approved withdrawn',
    ]);
    const states = ['draft', 'inReview', 'returned', 'approved', 'superseded', 'withdrawn'];
    const draft = await makeDraft(plant, { gradeGroup: 'states' });
    for (const from of states) {
      for (const to of states.filter((state) => state !== from)) {
        // Put into the first state without asking anybody, then asked to go to the second.
        const moved = connected(server.database.superUrl, async (client) => {
          await client.query('begin');
          await client.query("select set_config('app.plant_id', $1, true)", [plant.id]);
          await client.query("set local session_replication_role = 'replica'");
          await client.query('update strategy_revisions set state = $1 where id = $2', [from, draft.id]);
          await client.query("set local session_replication_role = 'origin'");
          await client.query('update strategy_revisions set state = $1 where id = $2', [to, draft.id]);
        });
        if (allowed.has(`${from} ${to}`)) await moved;
        else await expect(moved, `${from} to ${to}`).rejects.toThrow(`a revision does not go from ${from} to ${to}`);
      }
    }
  });

  test('begins as a draft', async () => {
    const draft = await makeDraft(plant);
    await expect(
      inPlant(server.database.ownerUrl, (client) =>
        client.query(
          `insert into strategy_revisions select (jsonb_populate_record(r, jsonb_build_object('id', $2::text, 'number', 9, 'state', 'approved'))).*
           from strategy_revisions r where id = $1`,
          [draft.id, newId()],
        ),
      ),
    ).rejects.toThrow('a revision begins as a draft, not as approved');
  });

  test('is approved if and only if an approval has not ended', async () => {
    const submitted = await makeSubmitted(plant, { gradeGroup: 'half' });
    await expect(
      connected(server.database.appUrl, async (client) => {
        await client.query('begin');
        await client.query("select set_config('app.plant_id', $1, true)", [plant.id]);
        await client.query("update strategy_revisions set state = 'approved' where id = $1", [submitted.id]);
        await client.query('commit');
      }),
    ).rejects.toThrow('approved if and only if its approval has not ended');
  });

  test('names as author whoever changes its content, asked or not', async () => {
    const draft = await makeDraft(plant);
    const authors = await inPlant(server.database.appUrl, async (client) => {
      await client.query(
        `update strategy_revisions set content = content || '{"hottestPlate": 333.15}', hottest_plate = 333.15, changed_by = $2 where id = $1`,
        [draft.id, plant.userId('lead')],
      );
      const { rows } = await client.query<{ user_id: string }>(
        'select user_id from revision_authors where revision_id = $1',
        [draft.id],
      );
      return rows.map((row) => row.user_id).sort();
    });
    expect(authors).toEqual([plant.userId('engineer'), plant.userId('lead')].sort());
  });
});

describe('an approval', () => {
  test('cannot overlap another for the same machine, grade group and gas; side by side is fine', async () => {
    await makeApproved(plant, { gradeGroup: 'ranges', thickness: { min: 15_000, max: 18_000 } });
    await makeApproved(plant, { gradeGroup: 'ranges', thickness: { min: 18_000, max: 20_000 } });
    const across = await makeSubmitted(plant, { gradeGroup: 'ranges', thickness: { min: 17_999, max: 18_001 } });
    await expect(approveByHand(across.id, plant.userId('lead'))).rejects.toThrow('approvals_no_overlap');
  });

  test('is refused to whoever wrote the revision', async () => {
    const submitted = await makeSubmitted(plant, { gradeGroup: 'own work' });
    await expect(approveByHand(submitted.id, plant.userId('engineer'))).rejects.toThrow(
      'nobody approves what they wrote',
    );
  });

  test('is refused for a draft', async () => {
    const draft = await makeDraft(plant, { gradeGroup: 'draft' });
    await expect(approveByHand(draft.id, plant.userId('lead'))).rejects.toThrow(
      'only a revision in review can be approved',
    );
  });

  test('is for exactly what its revision says', async () => {
    const submitted = await makeSubmitted(plant, { gradeGroup: 'wider' });
    await expect(approveByHand(submitted.id, plant.userId('lead'), { thicknessMax: 30_000 })).rejects.toThrow(
      'approvals_are_what_the_revision_says',
    );
  });

  test('can only end, and once', async () => {
    const approved = await makeApproved(plant, { gradeGroup: 'ends' });
    await expect(
      inPlant(server.database.ownerUrl, (client) =>
        client.query('update approvals set approved_by = $2 where revision_id = $1', [
          approved.id,
          plant.userId('operator'),
        ]),
      ),
    ).rejects.toThrow('an approval can only end, once');
    await inPlant(server.database.appUrl, async (client) => {
      const end = `update approvals set ended_at = now(), ended_by = $2, ended_why = 'withdrawn' where revision_id = $1`;
      await client.query(end, [approved.id, plant.userId('lead')]);
      await expect(client.query(end, [approved.id, plant.userId('lead')])).rejects.toThrow(
        'an approval can only end, once',
      );
    });
    await expect(
      inPlant(server.database.ownerUrl, (client) =>
        client.query('delete from approvals where revision_id = $1', [approved.id]),
      ),
    ).rejects.toThrow('never changed or taken away');
  });
});

describe('a house rule', () => {
  const rewrite = `update house_rules set expression = expression || ' ', version = version + 1, changed_by = $1`;

  test('is there from a plant’s founding, twice on the reserve, and neither blocks before the lead says so', async () => {
    const rows = await inPlant(server.database.appUrl, async (client) => {
      const found = await client.query<{ expression: string; blocks: boolean; changed_by: string | null }>(
        'select expression, blocks, changed_by from house_rules order by expression',
      );
      return found.rows;
    });
    expect(rows).toEqual([
      { expression: 'reserveCold >= 2', blocks: false, changed_by: null },
      { expression: 'reserveHot >= 2.2', blocks: false, changed_by: null },
    ]);
  });

  test.each([
    ['stays itself', 'update house_rules set id = gen_random_uuid(), version = version + 1, changed_by = $1'],
    ['takes its next version with each change', 'update house_rules set blocks = true, changed_by = $1'],
    ['is changed by somebody', 'update house_rules set blocks = ($1::uuid is null), version = version + 1'],
    ['is never taken away', 'delete from house_rules where $1::uuid is not null'],
  ])('%s, whoever writes', async (_law, statement) => {
    await expect(
      inPlant(server.database.ownerUrl, (client) => client.query(statement, [plant.userId('lead')])),
    ).rejects.toThrow(/stays itself and takes its next version|is changed by somebody|never changed or taken away/);
  });

  test('that ended stays as it was', async () => {
    await inPlant(server.database.ownerUrl, async (client) => {
      const by = [plant.userId('lead')];
      await client.query('update house_rules set ended_at = now(), version = version + 1, changed_by = $1', by);
      await expect(client.query(rewrite, by)).rejects.toThrow('a house rule that ended stays as it was');
    });
  });

  test('begins in force', async () => {
    await expect(
      inPlant(server.database.appUrl, (client) =>
        client.query(
          `insert into house_rules (plant_id, id, expression, sentence, ended_at) values ($1, $2, 'stalls == 0', 'None.', now())`,
          [plant.id, newId()],
        ),
      ),
    ).rejects.toThrow('begins in force');
  });

  test('said something of a revision handed in that never changes, whoever writes', async () => {
    const submitted = await makeSubmitted(plant, { gradeGroup: 'judged' });
    for (const url of [server.database.appUrl, server.database.ownerUrl]) {
      await expect(
        inPlant(url, (client) =>
          client.query(`update strategy_revisions set house_rules = '[]' where id = $1`, [submitted.id]),
        ),
      ).rejects.toThrow('what the house rules said never changes once handed in');
    }
  });

  test.each(['broken', 'unclear'])('that blocks and is %s can’t be among what was handed in', async (state) => {
    const draft = await makeDraft(plant);
    await expect(
      inPlant(server.database.appUrl, (client) =>
        client.query(`update strategy_revisions set state = 'inReview', house_rules = $2 where id = $1`, [
          draft.id,
          JSON.stringify([
            { blocks: true, state: 'holds' },
            { blocks: true, state },
          ]),
        ]),
      ),
    ).rejects.toThrow('strategy_revisions_keeps_what_blocks');
  });
});

describe('what was said and done', () => {
  test.each(['reviews', 'record', 'revision_authors', 'machine_revisions'])(
    '%s are never changed, by the owner either',
    async (table) => {
      await makeApproved(plant, { gradeGroup: `kept ${table}` });
      await expect(
        inPlant(server.database.ownerUrl, (client) => client.query(`update ${table} set plant_id = plant_id`)),
      ).rejects.toThrow('never changed or taken away');
      await expect(inPlant(server.database.ownerUrl, (client) => client.query(`delete from ${table}`))).rejects.toThrow(
        'never changed or taken away',
      );
    },
  );

  test.each(['nozzles', 'grades', 'files'])('%s that something points at never become others', async (table) => {
    const id = newId();
    await expect(
      inPlant(server.database.ownerUrl, async (client) => {
        if (table === 'files') {
          await client.query(
            `insert into files (plant_id, id, key, content_type, bytes, sha256) values ($1, $2, $3, 'text/plain', 1, repeat('0', 64))`,
            [plant.id, id, `guards/${id}`],
          );
        }
        return client.query(`update ${table} set plant_id = plant_id`);
      }),
    ).rejects.toThrow('never changed or taken away');
  });

  test.each([
    'reviews',
    'record',
    'record_heads',
    'revision_authors',
    'approvals',
    'strategy_revisions',
    'house_rules',
    'rates',
    'layouts',
    'layout_versions',
    'placements',
  ])('%s are never emptied', async (table) => {
    await expect(
      inPlant(server.database.ownerUrl, (client) => client.query(`truncate ${table} cascade`)),
    ).rejects.toThrow('never changed or taken away');
  });

  test('the record’s number, time and hashes are not the writer’s to choose', async () => {
    await expect(
      inPlant(server.database.appUrl, (client) =>
        client.query(
          `insert into record (plant_id, sequence, event, subject_kind, subject_id, facts) values ($1, 1, 'x', 'plate', 'y', '{}')`,
          [plant.id],
        ),
      ),
    ).rejects.toThrow(/permission denied/);
  });
});

describe('the record’s chain', () => {
  const check = async () => {
    const lead = await plant.as('lead');
    return (await made(lead.call(recordEndpoints.verify))).body;
  };

  test('holds as it was written', async () => {
    const whole = await check();
    expect(whole.broken).toBeNull();
    expect(whole.entries).toBeGreaterThan(10);
  });

  test.each([
    [
      'a fact that was changed',
      `update record set facts = facts || '{"words": "nothing happened"}' where sequence = 4`,
      4,
    ],
    ['another person’s name under it', `update record set actor_id = gen_random_uuid() where sequence = 3`, 3],
    [
      'a text rewritten with its columns',
      `update record set event = 'plate.blessed', canonical = replace(canonical, event, 'plate.blessed') where sequence = 5`,
      5,
    ],
    [
      'a text rewritten with its columns and its hash',
      `update record set event = 'plate.blessed', canonical = replace(canonical, event, 'plate.blessed'),
         hash = encode(sha256(convert_to(previous_hash || replace(canonical, event, 'plate.blessed'), 'UTF8')), 'hex') where sequence = 5`,
      6,
    ],
    ['an entry taken out', 'delete from record where sequence = 6', 6],
    [
      'two entries exchanged',
      'update record set sequence = case sequence when 2 then 90002 when 3 then 2 end where sequence in (2, 3)',
      2,
    ],
  ])('gives away %s', async (_what, tampering, sequence) => {
    await tampered(tampering, async () => {
      expect((await check()).broken?.sequence).toBe(sequence);
    });
    expect((await check()).broken).toBeNull();
  });

  test('gives away entries cut off its end', async () => {
    const { entries } = await check();
    await tampered(`delete from record where sequence > ${entries - 2}`, async () => {
      expect((await check()).broken).toEqual({
        sequence: entries - 1,
        why: `the record should end with number ${entries}`,
      });
    });
  });
});

/** As the owner with the record's triggers off, as no user of the product ever is; then put back as it was. */
async function tampered(statement: string, look: () => Promise<void>): Promise<void> {
  const asOwner = (work: (client: pg.Client) => Promise<unknown>) =>
    connected(server.database.ownerUrl, async (client) => {
      await client.query('begin');
      await client.query("select set_config('app.plant_id', $1, true)", [plant.id]);
      await client.query('alter table record disable trigger user');
      await work(client);
      await client.query('alter table record enable trigger user');
      await client.query('commit');
    });
  await asOwner(async (client) => {
    await client.query('create table record_before as select * from record');
    expect((await client.query(statement)).rowCount).toBeGreaterThan(0);
  });
  try {
    await look();
  } finally {
    await asOwner(async (client) => {
      await client.query('delete from record');
      await client.query('insert into record select * from record_before');
      await client.query('drop table record_before');
    });
  }
}

/** In a transaction of the plant, rolled back. */
async function inPlant<T>(url: string, work: (client: pg.Client) => Promise<T>): Promise<T> {
  return connected(url, async (client) => {
    await client.query('begin');
    await client.query("select set_config('app.plant_id', $1, true)", [plant.id]);
    return work(client);
  });
}

const approveByHand = (revisionId: string, by: string, change: { thicknessMax?: number } = {}) =>
  inPlant(server.database.appUrl, (client) =>
    client.query(
      `insert into approvals (plant_id, id, revision_id, strategy_id, machine_id, grade_group, gas, thickness_min, thickness_max, approved_by)
       select plant_id, $2, id, strategy_id, machine_id, grade_group, gas, thickness_min, coalesce($4, thickness_max), $3
       from strategy_revisions where id = $1`,
      [revisionId, newId(), by, change.thicknessMax ?? null],
    ),
  );

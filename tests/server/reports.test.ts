import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { limits } from '../../shared/limits.ts';
import { reportEndpoints } from '../../shared/reports.ts';
import { strategyEndpoints } from '../../shared/strategies.ts';
import { connected } from '../support/database.ts';
import { made, makeApproved, makeDraft, makePlant, type TestPlant } from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let operator: Caller;
let engineer: Caller;
let revisionId: string;
let strategyId: string;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'reports');
  operator = await plant.as('operator');
  engineer = await plant.as('engineer');
  ({ id: revisionId, strategyId } = await makeApproved(plant));
});
afterAll(() => server.close());

const report = () => ({
  id: newId(),
  revisionId,
  machineId: plant.machineId,
  plateId: plant.plateId,
  kind: 'erupted',
  words: 'It threw up.',
});
const drawn = (width: number, height: number) =>
  sharp({ create: { width, height, channels: 3, background: '#a04818' } });
const fileRows = async () =>
  connected(server.database.superUrl, async (client) =>
    Number((await client.query<{ count: string }>('select count(*) from files')).rows[0]?.count),
  );

describe('a photo', () => {
  test('is kept upright, small, and without where, when and with what it was taken', async () => {
    const bytes = await drawn(3000, 2000)
      .jpeg()
      .withExif({
        IFD0: { Make: 'Phonemaker', Copyright: 'the operator' },
        IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '53/1 32/1 0/1' },
      })
      .withMetadata({ orientation: 6 })
      .toBuffer();
    expect((await sharp(bytes).metadata()).exif).toBeDefined();
    const body = report();
    const answer = await made(operator.call(reportEndpoints.add, { body, file: { name: 'photo.jpg', bytes } }));
    // Orientation 6 is a camera turned by a quarter: the picture stands.
    expect(answer.body.photo).toEqual({ width: 1067, height: limits.photoSide });

    const read = await engineer.call(reportEndpoints.photo, { params: { reportId: body.id } });
    expect(read.headers['content-type']).toBe('image/jpeg');
    expect(read.headers['x-content-type-options']).toBe('nosniff');
    const kept = await sharp(read.bytes).metadata();
    expect(kept).toMatchObject({ format: 'jpeg', width: 1067, height: limits.photoSide });
    for (const trace of [kept.exif, kept.xmp, kept.iptc, kept.icc, kept.orientation]) expect(trace).toBeUndefined();
    expect(read.bytes.includes('Phonemaker')).toBe(false);
  });

  test.each(['png', 'webp'] as const)('may be a %s', async (format) => {
    const bytes = await drawn(40, 30).toFormat(format).toBuffer();
    const answer = await made(
      operator.call(reportEndpoints.add, { body: report(), file: { name: `x.${format}`, bytes } }),
    );
    expect(answer.body.photo).toEqual({ width: 40, height: 30 });
  });

  test('is no duty', async () => {
    expect((await made(operator.call(reportEndpoints.add, { body: report() }))).body.photo).toBeNull();
  });

  test.each([
    [
      'that is text with a picture’s name',
      'photo.jpg',
      Buffer.from('not a picture at all'),
      'The file is not a JPEG, PNG or WebP picture.',
    ],
    [
      'that is a drawing',
      'photo.svg',
      Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>'),
      'The file is not a JPEG',
    ],
    ['that is empty', 'photo.png', Buffer.alloc(0), 'The file is not a JPEG'],
    ['that stops half-way', 'photo.jpg', null, 'The picture is damaged'],
    [
      'as HEIC',
      'IMG_1.HEIC',
      Buffer.concat([Buffer.from([0, 0, 0, 24]), Buffer.from('ftypheic'), Buffer.alloc(64)]),
      'HEIC pictures can’t be read here.',
    ],
  ])('%s is refused, and nothing is kept', async (_what, name, given, why) => {
    const bytes = given ?? (await drawn(600, 400).jpeg().toBuffer()).subarray(0, 900);
    const [keys, rows] = [await server.storedKeys(), await fileRows()];
    const body = report();
    const answer = await operator.call(reportEndpoints.add, { body, file: { name, bytes } });
    expect(answer.status).toBe(422);
    expect(answer.problem.code).toBe('bad-photo');
    expect(answer.problem.detail).toContain(why);
    expect(await server.storedKeys()).toEqual(keys);
    expect(await fileRows()).toBe(rows);
    expect((await engineer.call(reportEndpoints.get, { params: { reportId: body.id } })).status).toBe(404);
  });

  test('of more pixels than are decoded is refused before it is', async () => {
    const bytes = await drawn(9000, 7000).png({ compressionLevel: 9 }).toBuffer();
    expect(bytes.length).toBeLessThan(limits.photoBytes);
    const answer = await operator.call(reportEndpoints.add, { body: report(), file: { name: 'wall.png', bytes } });
    expect(answer.problem).toMatchObject({
      code: 'bad-photo',
      detail: expect.stringContaining('more than 60 million pixels. Choose a smaller one') as unknown,
    });
  });

  test('larger than is taken is refused with 413', async () => {
    const answer = await operator.call(reportEndpoints.add, {
      body: report(),
      file: { name: 'photo.jpg', bytes: Buffer.alloc(limits.photoBytes + 1) },
    });
    expect(answer.status).toBe(413);
    expect(answer.problem.code).toBe('too-large');
  });

  test('of a report that is refused does not stay in the bucket', async () => {
    const keys = await server.storedKeys();
    const bytes = await drawn(40, 30).png().toBuffer();
    const answer = await operator.call(reportEndpoints.add, {
      body: { ...report(), revisionId: newId() },
      file: { name: 'x.png', bytes },
    });
    expect(answer.status).toBe(404);
    expect(await server.storedKeys()).toEqual(keys);
  });

  test('sent again under the same key is kept once', async () => {
    const bytes = await drawn(40, 30).png().toBuffer();
    const asked = { body: report(), file: { name: 'x.png', bytes }, key: newId() };
    await made(operator.call(reportEndpoints.add, asked));
    const keys = await server.storedKeys();
    await made(operator.call(reportEndpoints.add, asked));
    expect(await server.storedKeys()).toEqual(keys);
  });
});

describe('a report', () => {
  test('of a draft is refused to an operator, who knows no drafts', async () => {
    const draft = await makeDraft(plant);
    expect((await operator.call(reportEndpoints.add, { body: { ...report(), revisionId: draft.id } })).status).toBe(
      404,
    );
  });

  test('counts as open for its strategy until it is closed with what was found', async () => {
    const open = async () =>
      (await made(engineer.call(strategyEndpoints.list))).body.items.find(({ id }) => id === strategyId)?.openReports ??
      0;
    const before = await open();
    const { body, version } = await made(operator.call(reportEndpoints.add, { body: report() }));
    expect(await open()).toBe(before + 1);
    const close = { params: { reportId: body.id }, body: { words: 'The nozzle was worn.' } };
    const closed = await made(engineer.call(reportEndpoints.close, { ...close, version }));
    expect(closed.body.closed).toMatchObject({ by: { id: plant.userId('engineer') }, words: 'The nozzle was worn.' });
    expect(await open()).toBe(before);
    const again = await engineer.call(reportEndpoints.close, { ...close, version: closed.version });
    expect(again.problem).toMatchObject({ code: 'wrong-state', detail: 'The report is closed already.' });
  });
});

import { describe, expect, it } from 'vitest';
import type { DrawingAnswers, DrawingReading } from '../../../strategy/path/drawing/index.ts';
import { drawingRead } from '../../../strategy/path/drawing/index.ts';
import { contourArea, contourBox, contourCorners } from '../../../strategy/path/index.ts';

const sheet = (content: string, attributes = 'width="100mm" height="80mm" viewBox="0 0 100 80"', before = '') =>
  `<?xml version="1.0" encoding="UTF-8"?>${before}<svg xmlns="http://www.w3.org/2000/svg" xmlns:xlink="http://www.w3.org/1999/xlink" stroke="black" ${attributes}>${content}</svg>`;
const bytesOf = (text: string) => new TextEncoder().encode(text);

function read(text: string, answers?: DrawingAnswers): DrawingReading {
  const result = drawingRead(bytesOf(text), answers);
  if (result.kind === 'none') throw new Error(result.why);
  return result;
}
function refused(text: string): string {
  const result = drawingRead(bytesOf(text));
  if (result.kind === 'drawing') throw new Error('it was read');
  return result.why;
}
/** mm², without sign. */
const areas = (r: DrawingReading) => r.contours.map(({ contour }) => Math.abs(contourArea(contour)) * 1e6);
/** Boxes in mm: left, bottom, right, top. */
const boxes = (r: DrawingReading) =>
  r.contours.map(({ contour }) => {
    const { minX, minY, maxX, maxY } = contourBox(contour);
    return [minX, minY, maxX, maxY].map((v) => Math.round(v * 1e6) / 1e3 + 0);
  });
const circle = '<circle cx="50" cy="40" r="30"/>';

describe('basic shapes', () => {
  it('are read in the size the file states, with up as up', () => {
    const r = read(
      sheet(`<rect x="10" y="5" width="80" height="60"/><circle cx="30" cy="20" r="8"/><ellipse cx="60" cy="40" rx="10" ry="5"/>
        <polygon points="70,15 80,15 80,25"/><polyline points="20 50 30 50 30,60 20,60 20 50"/><line x1="1" y1="1" x2="5" y2="1"/>`),
    );
    expect(boxes(r)).toEqual([
      [10, 15, 90, 75],
      [22, 52, 38, 68],
      [50, 35, 70, 45],
      [70, 55, 80, 65],
      [20, 20, 30, 30],
    ]);
    expect(r.contours.map(({ role }) => role)).toEqual(['outer', 'hole', 'hole', 'hole', 'hole']);
    expect(areas(r)[2]).toBeCloseTo(Math.PI * 50, 1);
    expect(r.openChains).toHaveLength(1);
    expect([r.unit, r.unitAsked]).toEqual(['mm', false]);
    expect(r.deviation).toBeGreaterThan(0);
    expect(r.deviation).toBeLessThanOrEqual(1e-5);
    expect(r.entityCounts).toEqual({ rect: 1, circle: 1, ellipse: 1, polygon: 1, polyline: 1, line: 1 });
  });

  it('with rounded corners are arcs, and radii are no more than half a side', () => {
    const r = read(
      sheet(
        '<rect x="10" y="10" width="60" height="40" rx="5"/><rect x="20" y="20" width="20" height="10" rx="50" ry="3"/>',
      ),
    );
    expect(areas(r)[0]).toBeCloseTo(60 * 40 - (4 - Math.PI) * 25, 6);
    const kinds = r.contours[0]?.contour.segments.map(({ kind }) => kind) ?? [];
    expect([kinds.length, kinds.filter((kind) => kind === 'arc').length]).toEqual([8, 4]);
    expect(areas(r)[1]).toBeCloseTo(20 * 10 - (4 - Math.PI) * 10 * 3, 0);
    expect(contourCorners(r.contours[0]?.contour ?? { segments: [] }, 0.01)).toEqual([]);
  });
});

describe('paths', () => {
  it('of all commands, absolute and relative, meet where they should', () => {
    const r = read(sheet('<path d="M10 10h40v10l-5 5q-5,5 -10 0t-10 0c-5-5-10-5-10 5s-2 8-5 3Z m 2 2 h 4 v4 h-4 z"/>'));
    expect(r.contours).toHaveLength(2);
    expect(boxes(r)[1]).toEqual([12, 64, 16, 68]);
    expect(r.openChains).toEqual([]);
    expect(r.repaired).toEqual([]);
  });

  it('with elliptical arcs, turned, too small for their chord and with flags run together, are exact', () => {
    const r = read(
      sheet(
        `<path d="M20 40a20 20 0 01 40 0a20 20 0 01-40 0z"/><path d="M 30 40 A 5 2.5 30 1 1 38 43 A5 2.5 30 0 1 30 40Z"/><path d="M70 40 A1 1 0 0 1 90 40 A 10 10 0 0 1 70 40"/>`,
      ),
    );
    expect(areas(r)[0]).toBeCloseTo(Math.PI * 400, 6);
    expect(areas(r)[1]).toBeCloseTo(Math.PI * 12.5, 0);
    expect(areas(r)[2]).toBeCloseTo(Math.PI * 100, 6);
    expect(r.contours[0]?.contour.segments).toHaveLength(2);
  });

  it('with a fault are read up to it, and named with their line', () => {
    const r = read(sheet(`${circle}\n<path d="M1 1H5V5H1z M 9 9 L 12 x 3"/>`));
    expect(r.contours).toHaveLength(2);
    expect(r.mended).toMatchObject([
      {
        what: expect.stringMatching(/^path with an error in its data, read up to there \(line 2/) as unknown,
        count: 1,
      },
    ]);
  });

  it('that hold numbers beyond all drawings are refused', () => {
    expect(refused(sheet('<path d="M0 0H1e999V5Z"/>'))).toContain('more than 10 km away');
    expect(refused(sheet('<circle cx="1e12" cy="0" r="5"/>'))).toContain('more than 10 km away');
  });
});

describe('transforms', () => {
  it('in chains, through groups, are applied from the inside out', () => {
    const r = read(
      sheet(
        '<g transform="translate(50,40) rotate(90)"><rect transform="scale(2 1) translate(5)" width="10" height="4"/></g>',
      ),
    );
    // scaled and shifted to 10..30 × 0..4, turned a quarter clockwise as seen, moved
    expect(boxes(r)).toEqual([[46, 10, 50, 30]]);
  });

  it('that skew turn circles into ellipses, and mirrored outlines still have the part on their left', () => {
    const r = read(sheet('<circle transform="matrix(-1 0 0.5 1 60 0)" cx="20" cy="40" r="10"/>'));
    expect(areas(r)[0]).toBeCloseTo(Math.PI * 100, 0);
    expect(contourArea(r.contours[0]?.contour ?? { segments: [] })).toBeGreaterThan(0);
    expect(r.deviation).toBeLessThanOrEqual(1e-5);
  });

  it('about a point keep it', () => {
    expect(boxes(read(sheet('<rect transform="rotate(180, 50 40)" x="50" y="40" width="10" height="5"/>')))).toEqual([
      [40, 40, 50, 45],
    ]);
  });
});

describe('the size of a picture', () => {
  const square = '<rect x="0" y="0" width="10" height="10" fill="none"/>';
  it.each([
    ['width="100" height="100" viewBox="0 0 100 100"', (10 * 25.4) / 96, 'px'],
    ['viewBox="0 0 200 200"', (10 * 25.4) / 96, 'px'],
    ['width="4in" height="4in" viewBox="0 0 40 40"', 25.4, 'inch'],
    ['width="10cm" height="10cm" viewBox="0 0 100 100"', 10, 'cm'],
    ['width="720pt" height="720pt" viewBox="0 0 72 72"', 2540 / 72, 'mm'],
    ['width="6pc" height="6pc" viewBox="0 0 6 6"', 254 / 6, 'mm'],
    ['width="100mm" viewBox="0 0 50 50"', 20, 'mm'],
    // fitted into the middle, the smaller scale
    ['width="100mm" height="50mm" viewBox="0 0 100 100"', 5, 'mm'],
    ['width="100mm" height="50mm" viewBox="0 0 100 100" preserveAspectRatio="xMinYMin slice"', 10, 'mm'],
  ])('stated as %s makes 10 units %f mm', (attributes, side, unit) => {
    const r = read(sheet(square, attributes));
    const [left = NaN, , right = NaN] = boxes(r)[0] ?? [];
    expect(right - left).toBeCloseTo(side, 2);
    expect([r.unit, r.unitAsked]).toEqual([unit, unit === 'px']);
  });

  it('may be stretched', () => {
    const r = read(sheet(square, 'width="100mm" height="50mm" viewBox="0 0 100 100" preserveAspectRatio="none"'));
    expect(boxes(r)).toEqual([[0, 45, 10, 50]]);
  });

  it('in pixels alone is asked for, with pixels, millimetres and inches to choose from', () => {
    const r = read(sheet(square, 'width="100" height="100"'));
    const question = r.questions.find(({ kind }) => kind === 'unit');
    if (question?.kind !== 'unit') throw new Error('the unit is asked for');
    expect(question.readings.map(({ unit, width }) => [unit, Math.round(width * 1e6) / 1e3])).toEqual([
      ['mm', 10],
      ['inch', 254],
      ['px', 2.646],
    ]);
    const answered = read(sheet(square, 'width="100" height="100"'), { unit: 'mm' });
    expect([answered.unitAsked, boxes(answered)[0]]).toEqual([false, [0, 90, 10, 100]]);
  });
});

describe('what is not seen', () => {
  it('is no part of the cut, and named', () => {
    const r = read(
      sheet(`<style>.off { display: none } #ghost{visibility:hidden} rect.bare, ellipse { fill: none; stroke: none }</style>
        ${circle}<g class="off"><circle r="5" cx="5" cy="5"/></g><path id="ghost" d="M0 0H5V5Z"/><g visibility="hidden"><circle cx="50" cy="40" r="4" visibility="visible"/></g>
        <rect style="fill:none;stroke:none" width="9" height="9"/><ellipse rx="3" ry="2"/><defs><circle r="2"/></defs><symbol id="s"><circle r="1"/></symbol>`),
    );
    expect(areas(r).map(Math.round)).toEqual([Math.round(Math.PI * 900), Math.round(Math.PI * 16)]);
    expect(r.leftOut.map(({ what, count }) => [what, count])).toEqual([
      ['group that is not displayed', 1],
      ['path that is not visible', 1],
      ['rect without line and fill', 1],
      ['ellipse without line and fill', 1],
    ]);
  });

  it('as text, images and foreign content is left out where it stands', () => {
    const r = read(
      sheet(
        `${circle}<text x="10" y="70">LUG</text><image x="0" y="80" href="http://example.org/a.png"/><foreignObject><div/></foreignObject>`,
      ),
    );
    expect(
      r.leftOut.map(({ what, at }) => [what, at.map(({ x, y }) => [Math.round(x * 1e3), Math.round(y * 1e3)])]),
    ).toEqual([
      ['text', [[10, 10]]],
      ['image', [[0, 0]]],
      ['foreignObject', []],
    ]);
  });

  it('as a filled page is set aside, and can be taken', () => {
    const page = '<rect width="100" height="80" fill="white" stroke="none"/>';
    const r = read(sheet(page + circle));
    expect(r.contours).toHaveLength(1);
    expect(r.leftOut).toMatchObject([{ what: 'rect on the hidden layer "page rectangle"', count: 1 }]);
    expect(r.aside).toHaveLength(1);
    expect(read(sheet(page + circle), { layers: r.layers.map(({ name }) => name) }).contours).toHaveLength(2);
    // drawn as a line it may be the part itself
    expect(read(sheet('<rect width="100" height="80" fill="none"/>' + circle)).contours).toHaveLength(2);
  });
});

describe('layers and uses', () => {
  it('are the groups with a label, to take or leave', () => {
    const r = read(sheet(`<g label="Schnitt">${circle}</g><g label="Gravur"><circle cx="50" cy="40" r="5"/></g>`));
    expect(r.layers.map(({ name, pieces }) => [name, pieces])).toEqual([
      ['Schnitt', 1],
      ['Gravur', 1],
    ]);
    expect(
      read(sheet(`<g label="Schnitt">${circle}</g><g label="Gravur"><circle r="5"/></g>`), { layers: ['Schnitt'] })
        .contours,
    ).toHaveLength(1);
  });

  it('bring shapes, groups and symbols to their places', () => {
    const r = read(
      sheet(`<defs><g id="pair"><rect id="r" width="2" height="2"/><rect x="4" width="2" height="2"/></g></defs><symbol id="s" viewBox="0 0 1 1"><rect width="1" height="1"/></symbol>
        <use xlink:href="#pair" x="10" y="10"/><use href="#r" transform="translate(50 50) scale(3)"/><use href="#s" width="8" height="8"/>`),
    );
    expect(boxes(r)).toEqual([
      [10, 68, 12, 70],
      [14, 68, 16, 70],
      [50, 24, 56, 30],
      [0, 72, 8, 80],
    ]);
  });

  it('of themselves, of nothing and of other files are left out and named', () => {
    const r = read(sheet(`${circle}<g id="a"><use href="#a"/></g><use href="#nobody"/><use href="other.svg#x"/>`));
    expect(r.contours).toHaveLength(1);
    expect(r.leftOut.map(({ what }) => what).sort()).toEqual([
      'use of "#a" within itself, or too deep',
      'use of missing "#nobody"',
      'use of something in another file, which is not fetched',
    ]);
  });

  it('that multiply without end are refused', () => {
    const level = (n: number) =>
      `<g id="l${n}">${'<use href="#l' + (n - 1) + '"/>'.repeat(1)}${`<use href="#l${n - 1}"/>`.repeat(9)}</g>`;
    const text = sheet(
      `<defs><circle id="l0" r="1"/>${Array.from({ length: 9 }, (_, i) => level(i + 1)).join('')}</defs><use href="#l9"/>`,
    );
    expect(refused(text)).toContain('more than 200000 entities');
  });
});

describe('hostile text', () => {
  it('with a document type and entities is read without ever resolving one', () => {
    const bomb = `<!DOCTYPE svg [<!ENTITY a "aaaaaaaaaa"><!ENTITY b "&a;&a;&a;&a;&a;&a;"><!ENTITY x SYSTEM "file:///etc/passwd">]>`;
    const r = read(sheet(`${circle}<text>&b;&x;</text>`, undefined, bomb));
    expect(r.contours).toHaveLength(1);
    expect(r.leftOut.map(({ what }) => what)).toContain('entities of the document type, which are never resolved');
  });

  it('with scripts is read without them', () => {
    const r = read(sheet(`<script>alert(1)</script>${circle}`));
    expect(r.leftOut).toMatchObject([{ what: 'script, which is never run' }]);
  });

  it('that is not well-formed is refused with its line', () => {
    expect(refused(`${sheet('').slice(0, -6)}\n<g><circle r=5/></g></svg>`)).toMatch(
      /^Line 2 of the SVG is not well-formed: .+\.$/,
    );
    expect(refused(sheet('<g></circle></g>'))).toContain('not well-formed');
  });

  it('that stops early is read so far, and says so', () => {
    const whole = sheet(`${circle}<circle r="4"/><g>`);
    const r = read(whole.slice(0, whole.indexOf('<g>') + 3));
    expect(r.contours).toHaveLength(2);
    expect(r.leftOut).toMatchObject([{ what: 'end of the file (it stops before its last element is ended)' }]);
  });

  it('of groups within groups by thousands, of long comments and of XML of another kind is refused', () => {
    expect(refused(sheet('<g>'.repeat(5000) + circle + '</g>'.repeat(5000)))).toContain('more than 100 deep');
    expect(refused(`<!--${'-'.repeat(300_000)}`)).toContain('Export the part as DXF or SVG');
    expect(refused('<!--'.repeat(60_000))).toContain('Export the part as DXF or SVG');
    expect(refused('<html><svg/></html>')).toContain('its first element is "html"');
    expect(refused('<svg xmlns="http://www.w3.org/2000/svg"/>')).toContain('no lines, arcs or curves to cut');
  });
});

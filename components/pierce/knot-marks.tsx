import { Fragment } from 'react';
import Svg from 'react-native-svg';
import { knotText, type KnotWordings } from '@/components/text/pierce-designer.ts';
import { roles } from '@/components/theme/roles.ts';
import type { FocusScale } from '@/strategy/machine.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import type { EndPlace, KnotPlace, Place } from './knot-places.ts';
import { knotValueWordings } from './knot-value.ts';
import { laneUnit } from './lane-scale.ts';
import type { SectionGeometry } from './section-geometry.ts';
import { letteringWidth, type LaneName } from './section-layout.ts';
import { Lettering, Path, Rect } from './still-shapes.tsx';

/** A lane's knots, and where the lane begins, px. */
export type LaneOfKnots = { readonly lane: LaneName; readonly top: number; readonly knots: readonly KnotPlace[] };

type KnotMarksProps = {
  lanes: readonly LaneOfKnots[];
  ends: readonly EndPlace[];
  stages: readonly Stage[];
  dial: FocusScale;
  geometry: SectionGeometry;
  system: UnitSystem;
};

/** What can be taken hold of, as it is drawn over the section: the chosen one larger, with its value. */
export function KnotMarks({ lanes, ends, stages, dial, geometry, system }: KnotMarksProps) {
  const { width, height } = geometry;
  const chosenEnd = ends.find(({ chosen }) => chosen);
  return (
    <Svg aria-hidden width="100%" height={height} viewBox={`0 0 ${width} ${height}`} style={{ overflow: 'visible' }}>
      {lanes.map(({ lane, top, knots }) => {
        const chosen = knots.find((place) => place.chosen);
        return (
          <Fragment key={lane}>
            {knots.map((place, index) => (
              <Rect key={index} testID="lane-knot" {...place.mark} {...paint(place)} />
            ))}
            {chosen && (
              <KnotValue
                wordings={knotValueWordings(chosen.knot, stages, dial, system)}
                at={geometry.x(chosen.knot.time)}
                from={geometry.left + letteringWidth(`${knotText.laneShort(lane)}, ${laneUnit(lane, system)}`) + 10}
                to={geometry.right}
                y={top + 14}
              />
            )}
          </Fragment>
        );
      })}
      {ends.map((place) => (
        <Path key={place.stage} d={`M${place.mark.x} ${place.mark.y}h8v11l-4 6l-4 -6z`} {...paint(place)} />
      ))}
      {chosenEnd && <EndValue place={chosenEnd} geometry={geometry} />}
    </Svg>
  );
}

const paint = ({ chosen }: Place) => ({
  fill: chosen ? roles.ember : roles.sheet,
  stroke: chosen ? roles.ember : roles.ink,
  strokeWidth: 1.6,
});

/** The chosen duration beside its handle. */
function EndValue({ place, geometry }: { place: EndPlace; geometry: SectionGeometry }) {
  const end = place.mark.x + place.mark.width / 2;
  const text = knotText.duration(place.duration);
  const width = letteringWidth(text, 16) + 8;
  const before = end + 12 + width > geometry.right;
  return <Value x={before ? end - 12 - width : end + 10} y={geometry.handleRow + 6} width={width} text={text} />;
}

type KnotValueProps = { wordings: KnotWordings; at: number; from: number; to: number; y: number };

/** The chosen knot's value in the line of the lane's name: above the knot where there is room, and never under the name. */
function KnotValue({ wordings, at, from, to, y }: KnotValueProps) {
  const fitting = wordings.find((one) => letteringWidth(one, 16) + 8 <= to - from);
  const text = fitting ?? wordings.at(-1) ?? wordings[0];
  const width = letteringWidth(text, 16) + 8;
  return <Value x={Math.max(from, Math.min(to - width, at - width / 2))} y={y} width={width} text={text} />;
}

function Value({ x, y, width, text }: { x: number; y: number; width: number; text: string }) {
  return (
    <>
      <Rect x={x} y={y - 15} width={width} height={20} fill={roles.sheet} />
      <Lettering x={x + 4} y={y} figure size={16} colour={roles.ember}>
        {text}
      </Lettering>
    </>
  );
}

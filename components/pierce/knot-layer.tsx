import { StyleSheet, View } from 'react-native';
import { knotText } from '@/components/text/pierce-designer.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import { Handle } from './handle.tsx';
import type { KnotEditing } from './knot-editing.ts';
import { KnotMarks, type LaneOfKnots } from './knot-marks.tsx';
import { endPlaces, knotPlaces, type KnotPlace } from './knot-places.ts';
import { knotValueWordings } from './knot-value.ts';
import { targetRange, targetSteps } from './knots.ts';
import { laneNumber, type LaneScale } from './lane-scale.ts';
import type { SectionGeometry } from './section-geometry.ts';
import type { LaneName } from './section-layout.ts';

type KnotLayerProps = {
  editing: KnotEditing;
  stages: readonly Stage[];
  lanes: readonly LaneName[];
  scales: readonly LaneScale[];
  geometry: SectionGeometry;
  system: UnitSystem;
};

/** Everything in the section that can be taken hold of: the lanes' knots, and the stages' ends on the time axis. */
export function KnotLayer({ editing, stages, lanes, scales, geometry, system }: KnotLayerProps) {
  const chosen = editing.target;
  const drawn = lanes.flatMap((lane, index): (LaneOfKnots & { scale: LaneScale })[] => {
    const scale = scales[index];
    const top = geometry.laneTop(index);
    return scale
      ? [{ lane, top, scale, knots: knotPlaces({ stages, lane, scale, top, geometry, system, chosen }) }]
      : [];
  });
  const ends = endPlaces(stages, geometry, chosen);
  return (
    <View role="group" aria-label={knotText.layer} style={styles.layer}>
      <View style={styles.marks}>
        <KnotMarks lanes={drawn} dial={editing.profile.focusScale} {...{ ends, stages, geometry, system }} />
      </View>
      {drawn.map(({ lane, knots, scale }) => (
        <LaneHandles
          key={lane}
          perPixel={siPerPixel(lane, scale, geometry.box, system)}
          {...{ editing, stages, lane, knots, system }}
        />
      ))}
      <View role="group" aria-label={knotText.durations} style={styles.layer}>
        {ends.map((place) => (
          <Handle
            key={place.stage}
            axis="x"
            label={knotText.durationLabel(place.stage)}
            valueText={knotText.duration(place.duration)}
            value={place.duration}
            perPixel={geometry.secondsPerPixel}
            range={targetRange(stages, place.target, editing.profile)}
            steps={targetSteps(place.target, system)}
            tabbable
            {...{ editing, place }}
          />
        ))}
      </View>
    </View>
  );
}

type LaneHandlesProps = Pick<KnotLayerProps, 'editing' | 'stages' | 'system'> & {
  lane: LaneName;
  knots: readonly KnotPlace[];
  /** What is drawn in the lane for a pixel, SI. */
  perPixel: number;
};

/** The knots of a lane as one stop of the Tab key: left and right lead from one to the next. */
function LaneHandles({ lane, knots, perPixel, editing, stages, system }: LaneHandlesProps) {
  const own = knots.findIndex(({ chosen }) => chosen);
  return (
    <View role="group" aria-label={knotText.lane(lane)} style={styles.layer}>
      {knots.map((place, index) => {
        const { knot, target } = place;
        return (
          <Handle
            key={`${knot.ends[0].stage} ${knot.ends[0].end}`}
            axis="y"
            label={knotText.knotLabel(knot)}
            valueText={knotValueWordings(knot, stages, editing.profile.focusScale, system)[0]}
            value={knot.set}
            // power is moved by its peak: a pixel of mean is more of peak
            perPixel={perPixel / (lane === 'meanPower' ? knot.duty : 1)}
            range={targetRange(stages, target, editing.profile)}
            steps={targetSteps(target, system)}
            tabbable={place.chosen || (own < 0 && index === 0)}
            {...{ editing, place }}
          />
        );
      })}
    </View>
  );
}

const siPerPixel = (lane: LaneName, { floor, most }: LaneScale, box: number, system: UnitSystem): number =>
  (most - floor) / box / laneNumber(1, lane, system);

const styles = StyleSheet.create({
  // only what can be taken hold of takes touches: the page scrolls under all the rest
  layer: { position: 'absolute', left: 0, right: 0, top: 0, bottom: 0, pointerEvents: 'box-none' },
  marks: { position: 'absolute', left: 0, right: 0, top: 0, bottom: 0, pointerEvents: 'none' },
});

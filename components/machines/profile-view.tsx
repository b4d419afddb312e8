import { machinesText, profileText } from '@/components/text/machines.ts';
import { Columns } from '@/components/ui/columns.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { MachineProfile } from '@/strategy/machine.ts';
import { numberText, quantityText, type Dimension } from '@/strategy/units/index.ts';
import { FocusReading } from './focus-reading.tsx';

/** A machine's profile as a sheet to read. */
export function ProfileView({ profile }: { readonly profile: MachineProfile }) {
  const system = useUnitSystem();
  const shown = (value: number, dimension: Dimension, unit?: string) =>
    quantityText(value, dimension, system, unit === undefined ? {} : { unit }).text;
  const metres = system === 'metric' ? 'm' : 'ft';
  const { source, optics, focusScale, standoff, oxygen, axes, bed, heights, loading } = profileText;
  const given = (label: string, value: number | null | undefined, dimension: Dimension, unit?: string) => ({
    label,
    value: value === undefined || value === null ? profileText.notGiven : shown(value, dimension, unit),
  });
  return (
    <Columns least={340}>
      <Panel title={focusScale.title}>
        <FocusReading scale={profile.focusScale} />
        <Facts
          items={[
            { label: focusScale.reference, value: focusScale.references[profile.focusScale.reference] },
            { label: focusScale.slope.label, value: numberText(profile.focusScale.slope, 3) },
            { label: focusScale.offset.label, value: shown(profile.focusScale.offset, 'length') },
            {
              label: focusScale.dialRange,
              value: `${quantityText(profile.focusScale.minDial, 'length', 'metric').number} to ${shown(profile.focusScale.maxDial, 'length', 'mm')}`,
            },
          ]}
        />
      </Panel>
      <Panel title={source.title}>
        <Facts
          items={[
            { label: source.maxPower.label, value: shown(profile.source.maxPower, 'power') },
            { label: source.minPower.label, value: shown(profile.source.minPower, 'power') },
            { label: source.wavelength.label, value: shown(profile.source.wavelength, 'length', 'µm') },
            { label: source.riseTime.label, value: shown(profile.source.riseTime, 'time', 'µs') },
            { label: source.minFrequency.label, value: shown(profile.source.minFrequency, 'frequency') },
            { label: source.maxFrequency.label, value: shown(profile.source.maxFrequency, 'frequency') },
            { label: source.minDuty.label, value: shown(profile.source.minDuty, 'ratio') },
          ]}
        />
      </Panel>
      <Panel title={optics.title}>
        <Facts
          items={[
            { label: optics.coreDiameter.label, value: shown(profile.optics.coreDiameter, 'length', 'µm') },
            { label: optics.halfAngle.label, value: shown(profile.optics.halfAngle, 'angle', 'mrad') },
            {
              label: optics.collimatorFocalLength.label,
              value: shown(profile.optics.collimatorFocalLength, 'length', 'mm'),
            },
            {
              label: optics.focusingFocalLength.label,
              value: shown(profile.optics.focusingFocalLength, 'length', 'mm'),
            },
          ]}
        />
      </Panel>
      <Panel title={`${standoff.title} and ${oxygen.title.toLowerCase()}`}>
        <Facts
          items={[
            { label: standoff.min.label, value: shown(profile.standoff.min, 'length') },
            { label: standoff.max.label, value: shown(profile.standoff.max, 'length') },
            { label: oxygen.minPressure.label, value: shown(profile.oxygen.minPressure, 'pressure') },
            { label: oxygen.maxPressure.label, value: shown(profile.oxygen.maxPressure, 'pressure') },
          ]}
        />
      </Panel>
      <Panel title={axes.title}>
        <Facts
          items={[
            { label: axes.maxFeed.label, value: shown(profile.axes.maxFeed, 'speed') },
            { label: axes.acceleration.label, value: shown(profile.axes.acceleration, 'acceleration') },
            { label: axes.jerk.label, value: shown(profile.axes.jerk, 'jerk') },
            { label: axes.smallestArc.label, value: shown(profile.smallestArc, 'length') },
          ]}
        />
      </Panel>
      <Panel title={bed.title}>
        <Facts
          items={[
            { label: bed.length.label, value: shown(profile.bed.length, 'length', metres) },
            { label: bed.width.label, value: shown(profile.bed.width, 'length', metres) },
            {
              label: bed.tables,
              value: profile.bed.shuttleTable ? machinesText.shuttle : machinesText.noShuttle,
            },
          ]}
        />
      </Panel>
      <Panel title={heights.title}>
        <Facts
          items={[
            given(heights.travel.label, profile.heights?.travel, 'length'),
            given(heights.speed.label, profile.heights?.speed, 'speed', 'm/min'),
            given(heights.acceleration.label, profile.heights?.acceleration, 'acceleration'),
            given(loading.time.label, profile.loading?.time, 'time'),
            given(loading.exchange.label, profile.loading?.exchange, 'time'),
          ]}
        />
      </Panel>
    </Columns>
  );
}

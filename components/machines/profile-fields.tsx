import type { Control } from 'react-hook-form';
import { profileText } from '@/components/text/machines.ts';
import { Columns } from '@/components/ui/columns.tsx';
import { FormNumber, FormTick } from '@/components/ui/form-fields.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { MachineFormIn, MachineFormOut } from './machine-form.tsx';

type Bound = { readonly control: Control<MachineFormIn, unknown, MachineFormOut> };

/** Every number of the profile but the focus dial's, in groups from the source to the bed. */
export function ProfileFields({ control }: Bound) {
  const metres = useUnitSystem() === 'metric' ? 'm' : 'ft';
  const { source, optics, standoff, oxygen, axes, bed } = profileText;
  return (
    <>
      <Panel title={source.title}>
        <Columns>
          <FormNumber control={control} name="profile.source.maxPower" dimension="power" {...source.maxPower} />
          <FormNumber control={control} name="profile.source.minPower" dimension="power" {...source.minPower} />
          <FormNumber
            control={control}
            name="profile.source.wavelength"
            dimension="length"
            unit="µm"
            {...source.wavelength}
          />
          <FormNumber
            control={control}
            name="profile.source.riseTime"
            dimension="time"
            unit="µs"
            {...source.riseTime}
          />
          <FormNumber
            control={control}
            name="profile.source.minFrequency"
            dimension="frequency"
            {...source.minFrequency}
          />
          <FormNumber
            control={control}
            name="profile.source.maxFrequency"
            dimension="frequency"
            {...source.maxFrequency}
          />
          <FormNumber control={control} name="profile.source.minDuty" dimension="ratio" {...source.minDuty} />
        </Columns>
      </Panel>
      <Panel title={optics.title}>
        <Columns>
          <FormNumber
            control={control}
            name="profile.optics.coreDiameter"
            dimension="length"
            unit="µm"
            {...optics.coreDiameter}
          />
          <FormNumber
            control={control}
            name="profile.optics.halfAngle"
            dimension="angle"
            unit="mrad"
            {...optics.halfAngle}
          />
          <FormNumber
            control={control}
            name="profile.optics.collimatorFocalLength"
            dimension="length"
            unit="mm"
            {...optics.collimatorFocalLength}
          />
          <FormNumber
            control={control}
            name="profile.optics.focusingFocalLength"
            dimension="length"
            unit="mm"
            {...optics.focusingFocalLength}
          />
        </Columns>
      </Panel>
      <Columns least={340}>
        <Panel title={standoff.title}>
          <FormNumber control={control} name="profile.standoff.min" dimension="length" {...standoff.min} />
          <FormNumber control={control} name="profile.standoff.max" dimension="length" {...standoff.max} />
        </Panel>
        <Panel title={oxygen.title}>
          <FormNumber
            control={control}
            name="profile.oxygen.minPressure"
            dimension="pressure"
            {...oxygen.minPressure}
          />
          <FormNumber
            control={control}
            name="profile.oxygen.maxPressure"
            dimension="pressure"
            {...oxygen.maxPressure}
          />
        </Panel>
      </Columns>
      <Panel title={axes.title}>
        <Columns>
          <FormNumber control={control} name="profile.axes.maxFeed" dimension="speed" unit="m/min" {...axes.maxFeed} />
          <FormNumber
            control={control}
            name="profile.axes.acceleration"
            dimension="acceleration"
            {...axes.acceleration}
          />
          <FormNumber control={control} name="profile.axes.jerk" dimension="jerk" {...axes.jerk} />
          <FormNumber control={control} name="profile.smallestArc" dimension="length" {...axes.smallestArc} />
        </Columns>
      </Panel>
      <Panel title={bed.title}>
        <Columns>
          <FormNumber control={control} name="profile.bed.length" dimension="length" unit={metres} {...bed.length} />
          <FormNumber control={control} name="profile.bed.width" dimension="length" unit={metres} {...bed.width} />
        </Columns>
        <FormTick control={control} name="profile.bed.shuttleTable" label={bed.shuttleTable.label} />
      </Panel>
    </>
  );
}

import type { Control, FieldPath } from 'react-hook-form';
import { profileText } from '@/components/text/machines.ts';
import { Columns } from '@/components/ui/columns.tsx';
import { FormNumber, FormTick } from '@/components/ui/form-fields.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Dimension } from '@/strategy/units/index.ts';
import type { MachineFormIn, MachineFormOut } from './machine-form.tsx';

type Bound = { readonly control: Control<MachineFormIn, unknown, MachineFormOut> };

type Row = {
  readonly name: FieldPath<MachineFormIn>;
  readonly dimension: Dimension;
  readonly label: string;
  readonly hint?: string;
  /** Where it is never given in the person's usual one. */
  readonly unit?: string;
  readonly optional?: boolean;
};

const { source, optics, standoff, oxygen, axes, bed, heights, loading } = profileText;

const sourceRows: readonly Row[] = [
  { name: 'profile.source.maxPower', dimension: 'power', ...source.maxPower },
  { name: 'profile.source.minPower', dimension: 'power', ...source.minPower },
  { name: 'profile.source.wavelength', dimension: 'length', unit: 'µm', ...source.wavelength },
  { name: 'profile.source.riseTime', dimension: 'time', unit: 'µs', ...source.riseTime },
  { name: 'profile.source.minFrequency', dimension: 'frequency', ...source.minFrequency },
  { name: 'profile.source.maxFrequency', dimension: 'frequency', ...source.maxFrequency },
  { name: 'profile.source.minDuty', dimension: 'ratio', ...source.minDuty },
];
const opticsRows: readonly Row[] = [
  { name: 'profile.optics.coreDiameter', dimension: 'length', unit: 'µm', ...optics.coreDiameter },
  { name: 'profile.optics.halfAngle', dimension: 'angle', unit: 'mrad', ...optics.halfAngle },
  { name: 'profile.optics.collimatorFocalLength', dimension: 'length', unit: 'mm', ...optics.collimatorFocalLength },
  { name: 'profile.optics.focusingFocalLength', dimension: 'length', unit: 'mm', ...optics.focusingFocalLength },
];
const standoffRows: readonly Row[] = [
  { name: 'profile.standoff.min', dimension: 'length', ...standoff.min },
  { name: 'profile.standoff.max', dimension: 'length', ...standoff.max },
];
const oxygenRows: readonly Row[] = [
  { name: 'profile.oxygen.minPressure', dimension: 'pressure', ...oxygen.minPressure },
  { name: 'profile.oxygen.maxPressure', dimension: 'pressure', ...oxygen.maxPressure },
];
const axesRows: readonly Row[] = [
  { name: 'profile.axes.maxFeed', dimension: 'speed', unit: 'm/min', ...axes.maxFeed },
  { name: 'profile.axes.acceleration', dimension: 'acceleration', ...axes.acceleration },
  { name: 'profile.axes.jerk', dimension: 'jerk', ...axes.jerk },
  { name: 'profile.smallestArc', dimension: 'length', ...axes.smallestArc },
];
const bedRows = (metres: 'm' | 'ft'): readonly Row[] => [
  { name: 'profile.bed.length', dimension: 'length', unit: metres, ...bed.length },
  { name: 'profile.bed.width', dimension: 'length', unit: metres, ...bed.width },
];

const heightRows: readonly Row[] = [
  { name: 'profile.heights.travel', dimension: 'length', optional: true, ...heights.travel },
  { name: 'profile.heights.speed', dimension: 'speed', unit: 'm/min', optional: true, ...heights.speed },
  { name: 'profile.heights.acceleration', dimension: 'acceleration', optional: true, ...heights.acceleration },
  { name: 'profile.loading.time', dimension: 'time', optional: true, ...loading.time },
  { name: 'profile.loading.exchange', dimension: 'time', optional: true, ...loading.exchange },
];

/** Every number of the profile but the focus dial's, in groups from the source to the bed. */
export function ProfileFields({ control }: Bound) {
  const metres = useUnitSystem() === 'metric' ? 'm' : 'ft';
  const numbers = (rows: readonly Row[]) => rows.map((row) => <FormNumber key={row.name} control={control} {...row} />);
  return (
    <>
      <Panel title={source.title}>
        <Columns>{numbers(sourceRows)}</Columns>
      </Panel>
      <Panel title={optics.title}>
        <Columns>{numbers(opticsRows)}</Columns>
      </Panel>
      <Columns least={340}>
        <Panel title={standoff.title}>{numbers(standoffRows)}</Panel>
        <Panel title={oxygen.title}>{numbers(oxygenRows)}</Panel>
      </Columns>
      <Panel title={axes.title}>
        <Columns>{numbers(axesRows)}</Columns>
      </Panel>
      <Panel title={bed.title}>
        <Columns>{numbers(bedRows(metres))}</Columns>
        <FormTick control={control} name="profile.bed.shuttleTable" label={bed.shuttleTable.label} />
      </Panel>
      <Panel title={heights.title}>
        <Small>{heights.words}</Small>
        <Columns>{numbers(heightRows)}</Columns>
      </Panel>
    </>
  );
}

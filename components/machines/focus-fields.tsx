import { useWatch, type Control } from 'react-hook-form';
import { profileText } from '@/components/text/machines.ts';
import { Columns } from '@/components/ui/columns.tsx';
import { FormChoice, FormNumber } from '@/components/ui/form-fields.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { focusScaleSchema } from '@/shared/machines.ts';
import { FocusReading } from './focus-reading.tsx';
import type { MachineFormIn, MachineFormOut } from './machine-form.tsx';

const { focusScale: text } = profileText;
const references = ['plate', 'nozzle'] as const;

/** How the machine's own dial reads, with what that means for the number to type, live. */
export function FocusFields({ control }: { readonly control: Control<MachineFormIn, unknown, MachineFormOut> }) {
  const typed = focusScaleSchema.safeParse(useWatch({ control, name: 'profile.focusScale' }));
  return (
    <Stack gap="l">
      <Body>{text.words}</Body>
      <Columns least={340} gap={24}>
        <Stack gap="l">
          <FormChoice
            control={control}
            name="profile.focusScale.reference"
            label={text.reference}
            options={references.map((value) => ({ value, label: text.references[value] }))}
          />
          <FormNumber control={control} name="profile.focusScale.slope" dimension="ratio" unit="×" {...text.slope} />
          <FormNumber control={control} name="profile.focusScale.offset" dimension="length" {...text.offset} />
          <FormNumber control={control} name="profile.focusScale.minDial" dimension="length" {...text.minDial} />
          <FormNumber control={control} name="profile.focusScale.maxDial" dimension="length" {...text.maxDial} />
        </Stack>
        {typed.success ? <FocusReading scale={typed.data} /> : <Small>{text.incomplete}</Small>}
      </Columns>
    </Stack>
  );
}

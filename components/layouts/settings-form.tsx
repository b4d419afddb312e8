import { useState, type ReactNode } from 'react';
import { layoutsText } from '@/components/text/layouts.ts';
import { Button } from '@/components/ui/button.tsx';
import { Form } from '@/components/ui/form.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { layoutFormSchema, type LayoutForm } from '@/shared/layouts.ts';
import type { PlateOutline } from '@/strategy/path/plate/index.ts';
import { PlateFields, plateTyped, usePlateRead } from './plate-fields.tsx';
import { firstRoom, RoomFields, roomRead, type RoomTyped } from './room-fields.tsx';

export type LayoutSettings = Pick<LayoutForm, 'name' | 'plate' | 'kerfWidth' | 'clearance' | 'edgeMargin'>;

type SettingsFormProps = {
  /** None for a new layout. */
  start: LayoutSettings | null;
  action: string;
  main?: boolean;
  busy?: boolean;
  error?: ReactNode;
  onUse: (settings: LayoutSettings, outline: PlateOutline, of: string | null) => void;
};

/** Name and plate of a layout, and what must stay free on it. */
export function SettingsForm({ start, action, main = false, busy = false, error, onUse }: SettingsFormProps) {
  const [name, setName] = useState(start?.name ?? '');
  const [plate, setPlate] = useState(plateTyped(start?.plate ?? null));
  const [room, setRoom] = useState<RoomTyped>({
    kerfWidth: start?.kerfWidth ?? firstRoom.kerfWidth,
    clearance: start?.clearance ?? firstRoom.clearance,
    edgeMargin: start?.edgeMargin ?? firstRoom.edgeMargin,
  });
  const [told, setTold] = useState(false);
  const plateRead = usePlateRead(plate);
  const nameRead = layoutFormSchema.shape.name.safeParse(name);
  return (
    <Form
      label={action}
      onSubmit={() => {
        setTold(true);
        const readRoom = roomRead(room);
        if (!nameRead.success || plateRead.kind === 'none' || readRoom === null) return;
        onUse({ name: nameRead.data, plate: plateRead.plate, ...readRoom }, plateRead.outline, plateRead.of);
      }}
    >
      <TextField
        label={layoutsText.name}
        value={name}
        onChange={setName}
        error={told && !nameRead.success ? nameRead.error.issues[0]?.message : undefined}
      />
      <PlateFields
        typed={plate}
        onChange={setPlate}
        error={told && plateRead.kind === 'none' ? plateRead.why : undefined}
      />
      <RoomFields typed={room} onChange={setRoom} told={told} />
      {error}
      <Button kind={main ? 'main' : 'plain'} submit label={action} busy={busy} />
    </Form>
  );
}

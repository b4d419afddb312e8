import { layoutsText } from '@/components/text/layouts.ts';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { layoutFormSchema } from '@/shared/layouts.ts';
import type { LayoutRoom } from '@/strategy/path/plate/index.ts';

export type RoomTyped = Readonly<Record<keyof LayoutRoom, number | null>>;

/** What a layout begins with: a kerf of thick plate, and steel between the cuts that keeps its shape. Common practice, own choice. */
export const firstRoom: LayoutRoom = { kerfWidth: 7e-4, clearance: 0.01, edgeMargin: 0.01 };

const fields = ['kerfWidth', 'clearance', 'edgeMargin'] as const;

/** The room that the fields mean; null while one of them means none. */
export function roomRead(typed: RoomTyped): LayoutRoom | null {
  const { kerfWidth, clearance, edgeMargin } = layoutFormSchema.shape;
  const read = [kerfWidth, clearance, edgeMargin].every((schema, i) => {
    const field = fields[i];
    return field !== undefined && schema.safeParse(typed[field] ?? Number.NaN).success;
  });
  return read
    ? { kerfWidth: typed.kerfWidth ?? 0, clearance: typed.clearance ?? 0, edgeMargin: typed.edgeMargin ?? 0 }
    : null;
}

/** What must stay free around each piece. `told` shows what is wrong with a field. */
export function RoomFields({
  typed,
  onChange,
  told,
}: {
  typed: RoomTyped;
  onChange: (typed: RoomTyped) => void;
  told: boolean;
}) {
  return (
    <Stack gap="m">
      <Stack gap="xs">
        <Body strong>{layoutsText.room}</Body>
        <Small>{layoutsText.roomHint}</Small>
      </Stack>
      <Row align="flex-start">
        {fields.map((field) => {
          const read = layoutFormSchema.shape[field].safeParse(typed[field] ?? Number.NaN);
          return (
            <Cell key={field} least={140}>
              <NumberField
                label={layoutsText[field]}
                dimension="length"
                value={typed[field]}
                onChange={(value) => onChange({ ...typed, [field]: value })}
                error={told && !read.success ? read.error.issues[0]?.message : undefined}
              />
            </Cell>
          );
        })}
      </Row>
    </Stack>
  );
}

import { useQuery } from '@tanstack/react-query';
import { partQuery, partsQuery } from '@/components/data/parts.ts';
import { platesQuery } from '@/components/data/plates.ts';
import { common } from '@/components/text/common.ts';
import { layoutsText } from '@/components/text/layouts.ts';
import { Choice } from '@/components/ui/choice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { laidPart, layoutPlateSchema, type LayoutPlate } from '@/shared/layouts.ts';
import { plateRectangle, plateRemnant, type PlateOutline } from '@/strategy/path/plate/index.ts';

/** What the fields hold; each way to say it keeps its own. */
export type PlateTyped = {
  readonly kind: LayoutPlate['kind'];
  readonly width: number | null;
  readonly height: number | null;
  readonly plateId: string | null;
  readonly partId: string | null;
};

export const plateTyped = (plate: LayoutPlate | null): PlateTyped => ({
  kind: plate?.kind ?? 'rectangle',
  width: plate?.kind === 'rectangle' ? plate.width : null,
  height: plate?.kind === 'rectangle' ? plate.height : null,
  plateId: plate?.kind === 'plate' ? plate.plateId : null,
  partId: plate?.kind === 'remnant' ? plate.partId : null,
});

export type PlateRead =
  | { readonly kind: 'ok'; readonly plate: LayoutPlate; readonly outline: PlateOutline; readonly of: string | null }
  | { readonly kind: 'none'; readonly why: string };

/** The plate that the fields mean, with its outline. */
export function usePlateRead(typed: PlateTyped): PlateRead {
  const plates = useQuery({ ...platesQuery(), enabled: typed.kind === 'plate' });
  const remnant = useQuery({
    ...partQuery(typed.partId ?? ''),
    enabled: typed.kind === 'remnant' && typed.partId !== null,
  });
  switch (typed.kind) {
    case 'rectangle': {
      const read = layoutPlateSchema.safeParse({
        kind: 'rectangle',
        width: typed.width ?? Number.NaN,
        height: typed.height ?? Number.NaN,
      });
      return read.success && read.data.kind === 'rectangle'
        ? { kind: 'ok', plate: read.data, outline: plateRectangle(read.data.width, read.data.height), of: null }
        : { kind: 'none', why: layoutsText.chooseSize };
    }
    case 'plate': {
      const plate = plates.data?.find(({ id }) => id === typed.plateId);
      if (!plate) return { kind: 'none', why: layoutsText.choosePlate };
      if (plate.length === null || plate.width === null) return { kind: 'none', why: layoutsText.sizeUnknown };
      return {
        kind: 'ok',
        plate: { kind: 'plate', plateId: plate.id },
        outline: plateRectangle(plate.length, plate.width),
        of: plate.tag,
      };
    }
    case 'remnant': {
      const part = remnant.data;
      const outline = part && plateRemnant(laidPart({ ...part, contours: part.reading.contours }).contours);
      if (!part || !outline) return { kind: 'none', why: layoutsText.chooseRemnant };
      return { kind: 'ok', plate: { kind: 'remnant', partId: part.id }, outline, of: part.name };
    }
  }
}

type PlateFieldsProps = { typed: PlateTyped; onChange: (typed: PlateTyped) => void; error?: string };

/** What is cut from: a size, a plate in the yard, or a remnant as it was drawn. */
export function PlateFields({ typed, onChange, error }: PlateFieldsProps) {
  return (
    <Stack gap="m">
      <Choice
        label={layoutsText.plate}
        options={(['rectangle', 'plate', 'remnant'] as const).map((value) => ({
          value,
          label: layoutsText.plateKinds[value],
        }))}
        value={typed.kind}
        onChange={(kind) => onChange({ ...typed, kind })}
      />
      {typed.kind === 'rectangle' && (
        <Row align="flex-start">
          <Cell least={130}>
            <NumberField
              label={layoutsText.width}
              dimension="length"
              value={typed.width}
              onChange={(width) => onChange({ ...typed, width })}
              error={error}
            />
          </Cell>
          <Cell least={130}>
            <NumberField
              label={layoutsText.height}
              dimension="length"
              value={typed.height}
              onChange={(height) => onChange({ ...typed, height })}
            />
          </Cell>
        </Row>
      )}
      {typed.kind === 'plate' && (
        <YardChoice value={typed.plateId} onChange={(plateId) => onChange({ ...typed, plateId })} error={error} />
      )}
      {typed.kind === 'remnant' && (
        <PartChoice
          label={layoutsText.remnant}
          hint={layoutsText.remnantHint}
          value={typed.partId}
          onChange={(partId) => onChange({ ...typed, partId })}
          error={error}
        />
      )}
    </Stack>
  );
}

type ChoiceOf = { value: string | null; onChange: (id: string) => void; error?: string };

function YardChoice(choice: ChoiceOf) {
  const system = useUnitSystem();
  const plates = useQuery(platesQuery());
  if (plates.isError) return <ErrorNotice error={plates.error} onRetry={() => void plates.refetch()} />;
  if (!plates.data) return <Progress label={common.loading} />;
  if (plates.data.length === 0) return <Body>{layoutsText.noYard}</Body>;
  return (
    <Choice
      {...choice}
      kind="list"
      label={layoutsText.yard}
      options={plates.data.map(({ id, tag, length, width }) => ({
        value: id,
        label: layoutsText.yardOption(tag, length, width, system),
      }))}
    />
  );
}

/** One of the plant's parts. */
export function PartChoice({ label, hint, ...choice }: ChoiceOf & { label: string; hint?: string }) {
  const parts = useQuery(partsQuery());
  if (parts.isError) return <ErrorNotice error={parts.error} onRetry={() => void parts.refetch()} />;
  if (!parts.data) return <Progress label={common.loading} />;
  if (parts.data.length === 0) return <Small>{layoutsText.noParts}</Small>;
  return (
    <Choice
      {...choice}
      kind="list"
      label={label}
      hint={hint}
      options={parts.data.map(({ id, name }) => ({ value: id, label: name }))}
    />
  );
}

import { useQuery } from '@tanstack/react-query';
import { useMemo, useState, type Dispatch } from 'react';
import { partQuery } from '@/components/data/parts.ts';
import { common } from '@/components/text/common.ts';
import { layoutsText } from '@/components/text/layouts.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { laidPart, placementSchema } from '@/shared/layouts.ts';
import { limits } from '@/shared/limits.ts';
import { placementArray, type LayoutPart, type PlacedPart } from '@/strategy/path/plate/index.ts';
import type { Point } from '@/strategy/path/index.ts';
import { nextNumber, type LayoutAction, type LayoutDraft } from './layout-draft.ts';
import { PartChoice } from './plate-fields.tsx';

type AddPiecesProps = {
  draft: LayoutDraft;
  lies: readonly PlacedPart[];
  dispatch: Dispatch<LayoutAction>;
  /** The first of those that were placed. */
  onPlaced: (number: number) => void;
};

/** A part to be placed, once or in rows and columns. */
export function AddPieces({ draft, lies, dispatch, onPlaced }: AddPiecesProps) {
  const [partId, setPartId] = useState<string | null>(null);
  const [told, setTold] = useState(false);
  const known = draft.parts.find(({ id }) => id === partId);
  const fetched = useQuery({ ...partQuery(partId ?? ''), enabled: partId !== null && !known });
  const part = useMemo(
    () => known ?? (fetched.data && laidPart({ ...fetched.data, contours: fetched.data.reading.contours })),
    [known, fetched.data],
  );
  return (
    <Panel title={layoutsText.add}>
      <PartChoice
        label={layoutsText.part}
        value={partId}
        onChange={setPartId}
        error={told && partId === null ? layoutsText.choosePart : undefined}
      />
      {fetched.isError && !known && <ErrorNotice error={fetched.error} onRetry={() => void fetched.refetch()} />}
      {partId !== null && !part && !fetched.isError && <Progress label={common.loading} />}
      {part ? (
        // where the next one would lie changes with what was placed: the fields begin afresh
        <ArrayForm
          key={`${part.id} ${lies.length}`}
          part={part}
          draft={draft}
          lies={lies}
          dispatch={dispatch}
          onPlaced={onPlaced}
        />
      ) : (
        partId === null && <Button label={layoutsText.place(1)} onPress={() => setTold(true)} />
      )}
    </Panel>
  );
}

function ArrayForm({ part, draft, lies, dispatch, onPlaced }: AddPiecesProps & { part: LayoutPart }) {
  const { form } = draft;
  const apart = 2 * form.kerfWidth + form.clearance;
  const [first] = useState(() => freePlace(draft, lies));
  const [rows, setRows] = useState('1');
  const [columns, setColumns] = useState('1');
  const [gap, setGap] = useState<{ x: number | null; y: number | null }>({ x: apart, y: apart });
  const [at, setAt] = useState<{ x: number | null; y: number | null }>(first);
  const [turn, setTurn] = useState<number | null>(0);
  const [mirrored, setMirrored] = useState(false);
  const [alternate, setAlternate] = useState(false);
  const [told, setTold] = useState(false);

  const counts = { rows: countRead(rows), columns: countRead(columns) };
  const number = (counts.rows ?? 0) * (counts.columns ?? 0);
  const tooMany = number + form.placements.length > limits.placements;
  const countError = (count: number | null) =>
    told && count === null ? layoutsText.whole : told && tooMany ? layoutsText.tooMany(limits.placements) : undefined;
  const several = number > 1 || counts.rows === null || counts.columns === null;
  const wrong = { x: notAt('x', at.x), y: notAt('y', at.y), turn: notTurn(turn) };
  const gapWrong = (metres: number | null) =>
    told && !(metres !== null && metres >= 0 && metres <= 60) ? layoutsText.outOfRange : undefined;

  const place = () => {
    setTold(true);
    const { rows: readRows, columns: readColumns } = counts;
    if (readRows === null || readColumns === null || tooMany || wrong.x || wrong.y || wrong.turn) return;
    if (at.x === null || at.y === null || turn === null) return;
    const gaps = { x: several ? gap.x : 0, y: several ? gap.y : 0 };
    if (gaps.x === null || gaps.y === null || !(gaps.x >= 0 && gaps.y >= 0)) return;
    const firstNumber = nextNumber(form.placements, 9999 - number);
    const pieces = placementArray(
      part,
      {
        rows: readRows,
        columns: readColumns,
        gap: { x: gaps.x, y: gaps.y },
        at: { x: at.x, y: at.y },
        turn,
        mirrored,
        alternate: several && alternate,
      },
      firstNumber,
    );
    dispatch({ do: 'place', pieces, part });
    onPlaced(firstNumber);
  };

  return (
    <Form label={layoutsText.add} onSubmit={place}>
      <Row align="flex-start">
        <Cell least={110}>
          <TextField label={layoutsText.rows} value={rows} onChange={setRows} error={countError(counts.rows)} />
        </Cell>
        <Cell least={110}>
          <TextField
            label={layoutsText.columns}
            value={columns}
            onChange={setColumns}
            error={countError(counts.columns)}
          />
        </Cell>
      </Row>
      {several && (
        <Row align="flex-start">
          <Cell least={130}>
            <NumberField
              label={layoutsText.gapX}
              dimension="length"
              value={gap.x}
              onChange={(x) => setGap({ ...gap, x })}
              error={gapWrong(gap.x)}
            />
          </Cell>
          <Cell least={130}>
            <NumberField
              label={layoutsText.gapY}
              dimension="length"
              value={gap.y}
              onChange={(y) => setGap({ ...gap, y })}
              error={gapWrong(gap.y)}
            />
          </Cell>
        </Row>
      )}
      <Row align="flex-start">
        <Cell least={130}>
          <NumberField
            label={layoutsText.fromLeft}
            dimension="length"
            value={at.x}
            onChange={(x) => setAt({ ...at, x })}
            error={told ? wrong.x : undefined}
          />
        </Cell>
        <Cell least={130}>
          <NumberField
            label={layoutsText.fromBelow}
            dimension="length"
            value={at.y}
            onChange={(y) => setAt({ ...at, y })}
            error={told ? wrong.y : undefined}
          />
        </Cell>
      </Row>
      <NumberField
        label={layoutsText.turn}
        dimension="angle"
        value={turn}
        onChange={setTurn}
        error={told ? wrong.turn : undefined}
      />
      <Stack gap="hair">
        <Tick label={layoutsText.mirrored} checked={mirrored} onChange={setMirrored} />
        {several && <Tick label={layoutsText.alternate} checked={alternate} onChange={setAlternate} />}
      </Stack>
      <Button submit label={layoutsText.place(Math.max(1, number))} />
    </Form>
  );
}

const countRead = (text: string): number | null => (/^\s*[1-9]\d{0,2}\s*$/.test(text) ? Number(text) : null);

const said = (read: { success: boolean; error?: { issues: { message: string }[] } }): string | undefined =>
  read.success ? undefined : read.error?.issues[0]?.message;
const notAt = (axis: 'x' | 'y', value: number | null) =>
  said(placementSchema.shape.at.shape[axis].safeParse(value ?? Number.NaN));
const notTurn = (value: number | null) => said(placementSchema.shape.turn.safeParse(value ?? Number.NaN));

/** Where the next piece may begin: to the right of all, or above them when the plate's right half is taken. */
function freePlace({ form, outline }: LayoutDraft, lies: readonly PlacedPart[]): Point {
  const margin = form.kerfWidth + form.edgeMargin;
  if (lies.length === 0) return { x: margin, y: margin };
  const apart = 2 * form.kerfWidth + form.clearance;
  const right = Math.max(...lies.map(({ box }) => box.maxX)) + apart;
  const above = Math.max(...lies.map(({ box }) => box.maxY)) + apart;
  const { maxX, maxY } = outline.box;
  return right < maxX * 0.75 || above > maxY * 0.9 ? { x: right, y: margin } : { x: margin, y: above };
}

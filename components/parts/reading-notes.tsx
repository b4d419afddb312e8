import { partsText } from '@/components/text/parts.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { DrawingReadingWire } from '@/shared/parts.ts';
import { ReadingMark, type ReadingMarkKind } from './reading-marks.tsx';

type ReadingNotesProps = {
  reading: DrawingReadingWire;
  /** Whether the places are marked on the drawing. */
  marked: boolean;
  onMark: (marked: boolean) => void;
};

/** What was left out, repaired or replaced while reading, each with the mark it has on the drawing: nothing happens to a drawing silently. */
export function ReadingNotes({ reading, marked, onMark }: ReadingNotesProps) {
  const system = useUnitSystem();
  const { openChains, leftOut, repaired, branches } = reading;
  const placed = [...leftOut, ...repaired].some(({ at }) => at.length > 0);
  const notes: { text: string; mark?: ReadingMarkKind }[] = [
    ...(openChains.length > 0 ? [{ text: partsText.openChains(openChains.length) }] : []),
    ...repaired.map(({ what, count, largest, at }) => ({
      text: partsText.repaired(what, count, largest, system),
      mark: at.length > 0 ? ('repaired' as const) : undefined,
    })),
    ...(branches.length > 0 ? [{ text: partsText.branches(branches.length), mark: 'branch' as const }] : []),
    ...leftOut.map(({ what, count, at }) => ({
      text: partsText.leftOut(what, count),
      mark: at.length > 0 ? ('leftOut' as const) : undefined,
    })),
    ...(reading.aside.length > 0 ? [{ text: partsText.aside }] : []),
    ...(reading.tooDense ? [{ text: partsText.tooDense }] : []),
    ...(reading.deviation > 1e-9 ? [{ text: partsText.deviation(reading.deviation) }] : []),
  ];
  return (
    <Panel title={partsText.noted}>
      {notes.length === 0 && <Body>{partsText.allTaken}</Body>}
      {notes.map(({ text, mark }) => (
        <Row key={text} wrap={false} gap="s" align="flex-start">
          {mark && marked ? <ReadingMark kind={mark} /> : null}
          <Stack grow>
            <Body>{text}</Body>
          </Stack>
        </Row>
      ))}
      <Body>{partsText.joined(reading.gapTolerance, system)}</Body>
      {(placed || branches.length > 0) && <Tick label={partsText.showPlaces} checked={marked} onChange={onMark} />}
    </Panel>
  );
}

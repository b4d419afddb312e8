import { partsText } from '@/components/text/parts.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Body } from '@/components/ui/text.tsx';
import type { DrawingReadingWire } from '@/shared/parts.ts';

/** What was left out, repaired or replaced while reading: nothing happens to a drawing silently. */
export function ReadingNotes({ reading }: { reading: DrawingReadingWire }) {
  const notes = [
    ...(reading.openChains.length > 0 ? [partsText.openChains(reading.openChains.length)] : []),
    ...reading.leftOut.map(({ what, count }) => partsText.leftOut(what, count)),
    ...reading.repaired.map(({ what, count }) => partsText.repaired(what, count)),
    ...(reading.deviation > 1e-9 ? [partsText.deviation(reading.deviation)] : []),
  ];
  return (
    <Panel title={partsText.noted}>
      {notes.length === 0 ? <Body>{partsText.allTaken}</Body> : notes.map((note) => <Body key={note}>{note}</Body>)}
    </Panel>
  );
}

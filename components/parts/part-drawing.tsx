import { useMemo } from 'react';
import { common } from '@/components/text/common.ts';
import { partsText, sizeText } from '@/components/text/parts.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Part } from '@/shared/parts.ts';
import { contourCorners } from '@/strategy/path/index.ts';
import { DrawingView } from './drawing-view.tsx';
import { asideTraces, readingMarks } from './reading-marks.tsx';

/** A part's technical drawing with its title block; `noted` with the places of what was noted while reading. */
export function PartDrawing({ part, noted = false }: { part: Part; noted?: boolean }) {
  const { wide } = useLayout();
  const system = useUnitSystem();
  const { reading } = part;
  const { min, max } = reading.bounds;
  const corners = useMemo(
    () => reading.contours.reduce((sum, contour) => sum + contourCorners(contour).length, 0),
    [reading.contours],
  );
  const marks = useMemo(() => readingMarks(reading), [reading]);
  const traces = useMemo(() => asideTraces(reading), [reading]);
  const count = (role: 'outer' | 'hole') => String(reading.contours.filter((one) => one.role === role).length);
  return (
    <Stack gap="m">
      <DrawingView
        label={partsText.drawing(part.name, reading, system)}
        contours={reading.contours}
        open={reading.openChains}
        traces={noted ? traces : undefined}
        marks={noted ? marks : undefined}
        height={wide ? 560 : 340}
      />
      <Sheet
        label={part.name}
        cells={[
          { label: partsText.block.size, value: sizeText(max.x - min.x, max.y - min.y, system), share: 2 },
          { label: partsText.block.outlines, value: count('outer') },
          { label: partsText.block.holes, value: count('hole') },
          { label: partsText.block.corners, value: String(corners) },
          {
            label: partsText.block.unit,
            value: reading.unit === null ? common.none : partsText.unitOption(reading.unit),
            share: 1.5,
          },
          { label: partsText.block.file, value: part.fileName, share: 2 },
        ]}
      />
    </Stack>
  );
}

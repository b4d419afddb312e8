import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { plateQuery, usePlateChange } from '@/components/data/plates.ts';
import { isProblem } from '@/components/data/problem.ts';
import { common } from '@/components/text/common.ts';
import { platesText } from '@/components/text/plates.ts';
import { Button } from '@/components/ui/button.tsx';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';
import type { Plate } from '@/shared/plates.ts';
import { PlateForm, type PlateFormIn } from './plate-form.tsx';

/** Corrects a plate. When somebody else corrected it first, their plate is shown above and one's own text stays until one lets it go. */
export function PlateCorrectForm({ plate }: { readonly plate: Plate }) {
  const client = useQueryClient();
  const change = usePlateChange();
  // What this person has seen, and what the form began from (a new key begins it afresh).
  const [seen, setSeen] = useState(plate.version);
  const [begun, setBegun] = useState({ from: plate, round: 0 });
  const [newer, setNewer] = useState<Plate | null>(null);
  const stale = isProblem(change.error, 'stale');

  const loadNewest = async () => {
    const newest = await client.fetchQuery({ ...plateQuery(plate.id), staleTime: 0 });
    setSeen(newest.version);
    setNewer(newest);
    change.reset();
  };

  return (
    <PlateForm
      key={begun.round}
      start={formOf(begun.from)}
      action={platesText.correct}
      error={stale ? null : change.error}
      busy={change.isPending}
      onSubmit={(body) =>
        change.mutate(
          { plateId: plate.id, version: seen, body },
          {
            onSuccess: (saved) => {
              setSeen(saved.version);
              setNewer(null);
            },
          },
        )
      }
      notice={
        <>
          {' '}
          {stale ? <ConflictNotice onLoad={() => void loadNewest()} /> : null}
          {newer === null ? null : (
            <Notice kind="caution" title={common.newest.title} live>
              <Body>{common.newest.words}</Body>
              <Row>
                <Button
                  label={common.newest.take}
                  onPress={() => {
                    setBegun({ from: newer, round: begun.round + 1 });
                    setNewer(null);
                  }}
                />
              </Row>
            </Notice>
          )}
          {change.isSuccess && !stale ? (
            <Notice kind="ok" live>
              {platesText.saved}
            </Notice>
          ) : null}
        </>
      }
    />
  );
}

/** The fields of a plate that its form holds; the schema is strict and takes no others. */
const formOf = (plate: Plate): PlateFormIn => ({
  tag: plate.tag,
  gradeId: plate.gradeId,
  heatNumber: plate.heatNumber,
  nominalThickness: plate.nominalThickness,
  measuredThickness: plate.measuredThickness,
  surface: plate.surface,
  certificate: plate.certificate,
  length: plate.length,
  width: plate.width,
});

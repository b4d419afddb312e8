import { useRouter } from 'expo-router';
import { useMemo, useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { useDrawingRead, usePartAdd } from '@/components/data/parts.ts';
import { isProblem } from '@/components/data/problem.ts';
import { Page } from '@/components/shell/page.tsx';
import { partsText, sizeText } from '@/components/text/parts.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { FilePicker, fits } from '@/components/ui/file-picker.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { nameSchema } from '@/shared/basics.ts';
import { limits } from '@/shared/limits.ts';
import type { DrawingAnswers, DrawingReadingWire } from '@/shared/parts.ts';
import { DrawingQuestions } from './drawing-questions.tsx';
import { DrawingView } from './drawing-view.tsx';
import { asideTraces, readingMarks } from './reading-marks.tsx';
import { ReadingNotes } from './reading-notes.tsx';

/** A drawing becomes a part: read, shown, asked about, and kept only then. The file stays chosen through every error. */
export function PartNewScreen() {
  const router = useRouter();
  const { wide } = useLayout();
  const system = useUnitSystem();
  const read = useDrawingRead();
  const add = usePartAdd();
  const [id] = useState(newId);
  const [file, setFile] = useState<File | null>(null);
  const [answers, setAnswers] = useState<DrawingAnswers>({});
  const [reading, setReading] = useState<DrawingReadingWire | null>(null);
  const [typedName, setName] = useState<string | null>(null);
  const [sent, setSent] = useState(false);
  const [marked, setMarked] = useState(true);

  const readWith = (chosen: File, given: DrawingAnswers) => {
    setAnswers(given);
    read.mutate({ file: chosen, answers: given }, { onSuccess: setReading });
  };
  const choose = (chosen: File | null) => {
    setFile(chosen);
    setReading(null);
    setAnswers({});
    setSent(false);
    add.reset();
    read.reset();
    if (chosen && fits(chosen, limits.drawingBytes)) readWith(chosen, {});
  };
  const suggested = file ? file.name.replace(/\.[^.]+$/, '').slice(0, limits.name) : '';
  const name = nameSchema.safeParse(typedName ?? suggested);
  const gaps = reading?.questions.find((question) => question.kind === 'gaps');
  const marks = useMemo(() => (reading && marked ? readingMarks(reading) : []), [reading, marked]);
  const traces = useMemo(() => (reading && marked ? asideTraces(reading) : []), [reading, marked]);
  const refusal = !reading
    ? null
    : reading.contours.length === 0
      ? partsText.nothingClosed
      : reading.unit === null
        ? partsText.unitFirst
        : reading.crossings.length > 0
          ? partsText.crossing(reading.crossings.length)
          : gaps && answers.gapTolerance === undefined
            ? partsText.gapsFirst
            : null;
  const keep = () => {
    setSent(true);
    if (!file || !reading || refusal !== null || !name.success) return;
    add.mutate(
      { file, body: { id, name: name.data, answers } },
      { onSuccess: (part) => router.replace(`/parts/${part.id}`) },
    );
  };

  const picker = (
    <FilePicker
      label={partsText.file}
      hint={partsText.fileHint}
      file={file}
      onChange={choose}
      accept=".dxf,.svg"
      maxBytes={limits.drawingBytes}
      tooLarge={partsText.tooLarge}
      error={sent && !file ? partsText.needFile : undefined}
    />
  );
  const state = (
    <>
      {read.isPending && <Progress label={reading ? partsText.rereading : partsText.reading} />}
      {read.isError && (
        <ErrorNotice
          error={read.error}
          // a drawing that was refused is refused again: it must be mended and chosen anew
          onRetry={file && !isProblem(read.error, 'bad-drawing') ? () => readWith(file, answers) : undefined}
        />
      )}
    </>
  );
  const form = reading && file && (
    <Form onSubmit={keep} label={partsText.newTitle}>
      <DrawingQuestions reading={reading} answers={answers} onAnswer={(given) => readWith(file, given)} />
      <ReadingNotes reading={reading} marked={marked} onMark={setMarked} />
      <TextField
        label={partsText.name}
        value={typedName ?? suggested}
        onChange={setName}
        error={sent && !name.success ? name.error.issues[0]?.message : undefined}
      />
      {sent && refusal !== null && (
        <Notice kind="caution" live>
          {refusal}
        </Notice>
      )}
      {add.isError && <ErrorNotice error={add.error} />}
      <Button kind="main" submit label={partsText.keep} busy={add.isPending} />
    </Form>
  );

  return (
    <Page title={partsText.newTitle} aside={reading ? form : undefined}>
      {picker}
      {state}
      {reading && reading.crossings.length > 0 && (
        <Notice kind="wrong">{partsText.crossing(reading.crossings.length)}</Notice>
      )}
      {reading && (
        <Stack gap="m">
          <DrawingView
            label={partsText.drawing(file?.name ?? partsText.one, reading, system)}
            contours={reading.contours}
            open={reading.openChains}
            traces={traces}
            marks={marks}
            height={wide ? 560 : 340}
          />
          <Sheet
            label={partsText.noted}
            cells={[
              {
                label: partsText.block.size,
                value: sizeText(
                  reading.bounds.max.x - reading.bounds.min.x,
                  reading.bounds.max.y - reading.bounds.min.y,
                  system,
                ),
                share: 2,
              },
              {
                label: partsText.block.outlines,
                value: String(reading.contours.filter(({ role }) => role === 'outer').length),
              },
              {
                label: partsText.block.holes,
                value: String(reading.contours.filter(({ role }) => role === 'hole').length),
              },
              {
                label: partsText.block.unit,
                value: reading.unit === null ? '?' : partsText.unitOption(reading.unit),
                share: 1.4,
              },
            ]}
          />
        </Stack>
      )}
    </Page>
  );
}

import { useQuery } from '@tanstack/react-query';
import { useEffect, useReducer, useRef, useState } from 'react';
import { layoutQuery, useLayoutChange } from '@/components/data/layouts.ts';
import { isProblem } from '@/components/data/problem.ts';
import type { DrawingControl } from '@/components/parts/drawing-view.tsx';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { layoutsText } from '@/components/text/layouts.ts';
import { momentText } from '@/components/text/moments.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { historyOf } from '@/components/ui/history.ts';
import { Button } from '@/components/ui/button.tsx';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Fold } from '@/components/ui/fold.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { laidPart, layoutFormSchema, outlineOf, type Layout } from '@/shared/layouts.ts';
import { may } from '@/shared/policy.ts';
import type { LayoutProblem } from '@/strategy/path/plate/index.ts';
import { AddPieces } from './add-pieces.tsx';
import { forgetLayout, keepLayout, keptLayout } from './kept-layouts.ts';
import { formOf, formSame, layoutReduce, nextNumber, type LayoutAction, type LayoutDraft } from './layout-draft.ts';
import { LayoutBlock } from './layout-block.tsx';
import { LayoutDrawing } from './layout-drawing.tsx';
import { LayoutPlans } from './layout-plans.tsx';
import { OrderList } from './order-list.tsx';
import { PieceList } from './piece-list.tsx';
import { PiecePanel } from './piece-panel.tsx';
import { ProblemList } from './problem-list.tsx';
import { SettingsForm } from './settings-form.tsx';
import { useLaid } from './use-laid.ts';

/** A plate with its pieces: where they lie, in which order they are cut, what is in the way. */
export function LayoutScreen({ id }: { id: string }) {
  const actor = useActor();
  const layout = useQuery(layoutQuery(id));
  if (layout.data && actor) {
    return (
      <LayoutEditor
        layout={layout.data}
        userId={actor.userId}
        mayWrite={may(actor, 'layout.write')}
        mayPlan={may(actor, 'cornerPlan.write')}
        refetch={async () => (await layout.refetch()).data ?? null}
      />
    );
  }
  return (
    <Page title={layoutsText.one}>
      {layout.isError ? (
        <ErrorNotice error={layout.error} onRetry={() => void layout.refetch()} />
      ) : (
        <Progress label={common.loading} />
      )}
    </Page>
  );
}

const draftOf = (layout: Layout): LayoutDraft => ({
  form: formOf(layout),
  outline: outlineOf(layout.outline),
  of: layout.outline.of,
  parts: layout.parts.map(laidPart),
});

type LayoutEditorProps = {
  layout: Layout;
  userId: string;
  mayWrite: boolean;
  mayPlan: boolean;
  /** Fetches the layout as it stands on the server. */
  refetch: () => Promise<Layout | null>;
};

/** A stretch around a problem that shows both pieces' edges, m. */
const problemStretch = 0.15;

function LayoutEditor({ layout, userId, mayWrite, mayPlan, refetch }: LayoutEditorProps) {
  const { wide } = useLayout();
  const [before] = useState(() => (mayWrite ? keptLayout(userId, layout.id) : null));
  // the version this draft was made from: what If-Match says, also after somebody else has saved
  const [base, setBase] = useState({ version: before?.version ?? layout.version, form: formOf(layout) });
  const [history, dispatch] = useReducer(layoutReduce, before?.draft ?? draftOf(layout), historyOf);
  const { draft } = history;
  const { form } = draft;
  const [restored, setRestored] = useState(before !== null);
  const [chosen, setChosen] = useState<number | null>(null);
  const [step, setStep] = useState(1e-3);
  const [way, setWay] = useState(true);
  const control = useRef<DrawingControl>(null);
  const change = useLayoutChange();
  const { lies, order, judgement } = useLaid(draft);
  const dirty = !formSame(form, base.form);

  // Was it laid out elsewhere while nothing was changed here? Then the newest is shown.
  if (!dirty && layout.version !== base.version && !change.isPending) {
    setBase({ version: layout.version, form: formOf(layout) });
    dispatch({ do: 'load', draft: draftOf(layout) });
  }
  useEffect(() => {
    if (!mayWrite) return undefined;
    if (dirty) keepLayout(userId, layout.id, base.version, draft);
    else forgetLayout(userId, layout.id);
    if (!dirty) return undefined;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [mayWrite, dirty, userId, layout.id, base.version, draft]);

  const save = (version = base.version) =>
    change.mutate(
      { layoutId: layout.id, version, body: { ...form, order: form.order === null ? null : [...order] } },
      {
        onSuccess: (saved) => {
          setBase({ version: saved.version, form: formOf(saved) });
          setRestored(false);
          // What was changed while it was being saved stays changed.
          dispatch({ do: 'saved', sent: form, draft: draftOf(saved) });
        },
      },
    );
  const stale = isProblem(change.error, 'stale');
  const takeTheirs = async () => {
    const theirs = await refetch();
    if (!theirs) return;
    setBase({ version: theirs.version, form: formOf(theirs) });
    dispatch({ do: 'load', draft: draftOf(theirs) });
    setRestored(false);
    change.reset();
  };
  const saveMine = async () => {
    const theirs = await refetch();
    if (theirs) save(theirs.version);
  };

  const piece = form.placements.find(({ number }) => number === chosen);
  const nameOf = (partId: string) => draft.parts.find(({ id }) => id === partId)?.name ?? '';
  const act = (action: LayoutAction) => {
    change.reset();
    dispatch(action);
  };
  const copy = () => {
    const part = draft.parts.find(({ id }) => id === piece?.partId);
    const lying = lies.find(({ number }) => number === chosen);
    if (!piece || !part || !lying) return;
    const number = nextNumber(form.placements);
    const x = lying.box.maxX + 2 * form.kerfWidth + form.clearance;
    act({ do: 'place', part, pieces: [{ ...piece, number, at: { x, y: piece.at.y } }] });
    setChosen(number);
  };
  const show = ({ placements, at }: LayoutProblem) => {
    setChosen(placements.at(-1) ?? null);
    control.current?.goTo(at, problemStretch);
  };

  const piecePanel = piece && mayWrite && (
    <PiecePanel
      key={piece.number}
      piece={piece}
      name={nameOf(piece.partId)}
      step={step}
      onStep={setStep}
      dispatch={act}
      onCopy={copy}
      onClose={() => setChosen(null)}
    />
  );
  const orderList = lies.length > 0 && (
    <OrderList
      lies={lies}
      order={order}
      byHand={form.order !== null}
      chosen={chosen}
      onChoose={setChosen}
      dispatch={mayWrite ? act : null}
    />
  );
  const pieces = lies.length > 0 && (
    <PieceList
      placements={form.placements}
      nameOf={nameOf}
      problems={judgement.problems}
      chosen={chosen}
      onChoose={setChosen}
    />
  );
  const aside = (
    <>
      {wide && piecePanel}
      {mayWrite && <AddPieces draft={draft} lies={lies} dispatch={act} onPlaced={setChosen} />}
      {pieces}
      <LayoutPlans layout={layout} unsaved={dirty} mayPlan={mayPlan} />
      {mayWrite && (
        <Panel>
          <Fold label={layoutsText.plateAndRoom}>
            <SettingsForm
              key={base.version}
              start={form}
              action={layoutsText.useThese}
              onUse={(settings, outline, of) => act({ do: 'settings', settings, outline, of })}
            />
          </Fold>
        </Panel>
      )}
    </>
  );

  return (
    <Page title={form.name} eyebrow={layoutsText.one} aside={aside} estimates>
      <LayoutDrawing
        name={form.name}
        outline={draft.outline}
        lies={lies}
        order={order}
        problems={judgement.problems}
        chosen={chosen}
        onChoose={setChosen}
        onPush={
          mayWrite
            ? (number, by) => {
                const at = form.placements.find((one) => one.number === number)?.at;
                if (at) act({ do: 'put', number, change: { at: { x: at.x + by.x, y: at.y + by.y } } });
              }
            : null
        }
        showWay={way}
        control={control}
      />
      <LayoutBlock draft={draft} lies={lies} judgement={judgement} />
      {mayWrite && (
        <Stack gap="s">
          {restored && dirty && <Small strong>{layoutsText.kept}</Small>}
          <Row>
            <Button
              kind="main"
              label={layoutsText.save}
              busy={change.isPending}
              disabled={!dirty || !layoutFormSchema.safeParse(form).success}
              onPress={() => save()}
            />
            <Button label={layoutsText.undo} disabled={history.past.length === 0} onPress={() => act({ do: 'undo' })} />
            <Button
              label={layoutsText.redo}
              disabled={history.future.length === 0}
              onPress={() => act({ do: 'redo' })}
            />
            <Small>{dirty ? layoutsText.unsaved : `${layout.changedBy.name}, ${momentText(layout.changedAt)}`}</Small>
          </Row>
          {stale ? (
            <Notice kind="caution" live>
              <Body>{layoutsText.stale}</Body>
              <Row>
                <Button label={layoutsText.saveMine} onPress={() => void saveMine()} />
                <Button label={layoutsText.takeTheirs} onPress={() => void takeTheirs()} />
              </Row>
            </Notice>
          ) : change.isError ? (
            <ErrorNotice error={change.error} />
          ) : (
            change.isSuccess &&
            !dirty && (
              <Notice kind="ok" live>
                {layoutsText.saved}
              </Notice>
            )
          )}
        </Stack>
      )}
      {!wide && piecePanel}
      {lies.length === 0 ? (
        <Empty title={layoutsText.nothing} />
      ) : (
        <>
          <Stack gap="hair">
            <Small>{layoutsText.tapHint}</Small>
            <Tick label={layoutsText.way} checked={way} onChange={setWay} />
          </Stack>
          <ProblemList problems={judgement.problems} more={judgement.moreProblems} onShow={show} />
        </>
      )}
      {orderList}
    </Page>
  );
}

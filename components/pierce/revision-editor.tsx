import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useReducer, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { machinesQuery } from '@/components/data/machines.ts';
import { nozzlesQuery } from '@/components/data/nozzles.ts';
import { isProblem } from '@/components/data/problem.ts';
import { useRevisionSave } from '@/components/data/revisions.ts';
import { strategyQuery } from '@/components/data/strategies.ts';
import { LiveHouseRules } from '@/components/rules/live-house-rules.tsx';
import { houseRulesText } from '@/components/text/house-rules.ts';
import { momentText } from '@/components/text/moments.ts';
import { compareText } from '@/components/text/pierce-designer.ts';
import { type Explained } from '@/components/text/pierce-explain.ts';
import { depthsAtEnds, stageResults } from '@/components/text/pierce-results.ts';
import { revisionText } from '@/components/text/pierce.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { historyOf } from '@/components/ui/history.ts';
import { Button } from '@/components/ui/button.tsx';
import { Dialog } from '@/components/ui/dialog.tsx';
import { Divider } from '@/components/ui/divider.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { reserveRulesOf } from '@/shared/prediction.ts';
import type { Revision } from '@/shared/strategies.ts';
import { CheckList } from './check-list.tsx';
import { CornerRulesSentence } from './corner-rules-sentence.tsx';
import { CutSentence } from './cut-sentence.tsx';
import { DraftProvider } from './draft-context.tsx';
import { historyReduce } from './draft-history.ts';
import { contentSame, draftOf, draftProblems } from './draft.ts';
import { ExplainDialog } from './explain.tsx';
import { ghostOf, type Ghost } from './ghost.ts';
import { GoodFor } from './good-for.tsx';
import { History } from './history.tsx';
import { forgetDraft, keepDraft, keptDraft } from './kept-drafts.ts';
import { ProposePanel } from './propose-panel.tsx';
import { SectionPanel, type SectionEdit } from './section-panel.tsx';
import { stageEnds } from './section-layout.ts';
import { SensitivityPanel } from './sensitivity-panel.tsx';
import { StageSentence, type StageResults } from './stage-sentence.tsx';
import { StepBar } from './step-bar.tsx';
import { useDraftProposal } from './use-draft-proposal.ts';
import { usePrediction } from './use-prediction.ts';
import { useUndoKeys } from './use-undo-keys.ts';

/** How a draft stands when somebody decides about it. */
export type DraftStanding = {
  readonly dirty: boolean;
  /** Every number can be read and is in its range. */
  readonly sound: boolean;
  /** The revision with everything typed saved; null when that failed. */
  readonly saved: () => Promise<Revision | null>;
};

type RevisionEditorProps = {
  revision: Revision;
  userId: string;
  /** May write strategies at all; a draft is the only thing that can be written in. */
  mayWrite: boolean;
  /** Fetches the revision as it stands on the server. */
  refetch: () => Promise<Revision | null>;
  /** Decisions that may be taken. */
  decisions: (draft: DraftStanding) => ReactNode;
};

/** The pierce designer: section, lanes and title block; the stages as sentences; checks; cut and corners. Read-only once handed in. */
export function RevisionEditor({ revision, userId, mayWrite, refetch, decisions }: RevisionEditorProps) {
  const { wide } = useLayout();
  const readOnly = revision.state !== 'draft' || !mayWrite;
  const before = readOnly ? null : keptDraft(userId, revision.id);
  // the version this draft was made from: what If-Match says, also after somebody else has saved
  const [base, setBase] = useState({ version: before?.version ?? revision.version, content: revision.content });
  const [restored] = useState(before !== null);
  const [steps, dispatch] = useReducer(historyReduce, before?.draft ?? draftOf(revision.content), historyOf);
  const { draft } = steps;
  const [chosen, setChosen] = useState<number | null>(null);
  const [dropping, setDropping] = useState(false);
  const [comparing, setComparing] = useState(false);
  const [proposing, setProposing] = useState(false);
  const [explained, setExplained] = useState<Explained | null>(null);
  const system = useUnitSystem();
  const save = useRevisionSave();

  const problems = useMemo(() => draftProblems(draft), [draft]);
  const dirty = !contentSame(draft.content, base.content) || Object.keys(draft.typed).length > 0;

  // Has it been changed elsewhere while nothing was typed here? Then the newest is shown.
  if (!dirty && revision.version !== base.version && !save.isPending) {
    setBase({ version: revision.version, content: revision.content });
    dispatch({ do: 'load', content: revision.content });
  }
  useEffect(() => {
    if (readOnly) return undefined;
    if (dirty) keepDraft(userId, revision.id, base.version, draft);
    else forgetDraft(userId, revision.id);
    if (!dirty) return undefined;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [readOnly, dirty, userId, revision.id, base.version, draft]);

  const machines = useQuery(machinesQuery());
  const nozzles = useQuery(nozzlesQuery());
  const machine = machines.data?.find(({ revisions }) =>
    revisions.some(({ id }) => id === draft.content.machineRevisionId),
  );
  const machineRevision = machine?.revisions.find(({ id }) => id === draft.content.machineRevisionId);
  const nozzle = nozzles.data?.find(({ id }) => id === draft.content.nozzleId) ?? null;
  const rules = useMemo(
    () => reserveRulesOf(revision.houseRules.map(({ expression }) => expression)),
    [revision.houseRules],
  );
  const live = usePrediction(draft.content, problems.size === 0, machineRevision?.profile ?? null, nozzle, rules, {
    prediction: revision.prediction,
    content: revision.content,
    behind: false,
  });
  // a revision that can't be changed shows what was decided on, not what today's model would say
  const shown = readOnly ? { prediction: revision.prediction, content: revision.content, behind: false } : live;

  useUndoKeys(!readOnly, dispatch);
  const profile = machineRevision?.profile ?? null;
  const strategy = useQuery(strategyQuery(revision.strategyId));
  // the newest comes first
  const former = strategy.data?.revisions.find(({ number }) => number < revision.number) ?? null;

  const proposal = useDraftProposal({
    content: live.content,
    sound: problems.size === 0 && !live.behind,
    profile,
    nozzle,
    rules,
    houseRules: revision.houseRules,
  });
  const ghosts = useMemo<readonly Ghost[]>(
    () => [
      ...(comparing && former
        ? [ghostOf(compareText.label(former.number), former.content.stages, former.prediction)]
        : []),
      ...(proposal.ghost ? [proposal.ghost] : []),
    ],
    [comparing, former, proposal.ghost],
  );

  const saveNow = async (version: number): Promise<Revision | null> => {
    try {
      const saved = await save.mutateAsync({ revision: { id: revision.id, version }, content: draft.content });
      setBase({ version: saved.version, content: saved.content });
      return saved;
    } catch {
      return null; // said by the mutation's own error below
    }
  };
  const conflict = isProblem(save.error, 'stale');
  const problemCount = problems.size;
  const standing: DraftStanding = {
    dirty,
    sound: problemCount === 0,
    saved: async () => (dirty ? saveNow(base.version) : revision),
  };

  const saveBar = !readOnly && (
    <Stack gap="s">
      {dirty && (
        <Small strong>
          {restored && !save.isPending ? revisionText.restored : revisionText.unsaved}
          {problemCount > 0 ? ` ${revisionText.wrongFields(problemCount)}` : ''}
        </Small>
      )}
      {save.isSuccess && !dirty && (
        <View role="status">
          <Small>{revisionText.saved}</Small>
        </View>
      )}
      {conflict ? (
        <Notice kind="caution" title={revisionText.conflict.title} live>
          <Body>{revisionText.conflict.detail}</Body>
          <Row>
            <Button
              label={revisionText.conflict.mine}
              busy={save.isPending}
              onPress={async () => {
                const theirs = await refetch();
                if (theirs) await saveNow(theirs.version);
              }}
            />
            <Button
              label={revisionText.conflict.theirs}
              onPress={async () => {
                const theirs = await refetch();
                if (!theirs) return;
                setBase({ version: theirs.version, content: theirs.content });
                dispatch({ do: 'load', content: theirs.content });
                save.reset();
              }}
            />
          </Row>
        </Notice>
      ) : (
        save.error !== null && <ErrorNotice error={save.error} onRetry={() => void saveNow(base.version)} />
      )}
      <Row>
        <Button
          kind={dirty ? 'main' : 'plain'}
          label={revisionText.save}
          busy={save.isPending}
          disabled={!dirty || problemCount > 0}
          onPress={() => void saveNow(base.version)}
        />
        {dirty && <Button kind="quiet" label={revisionText.drop} onPress={() => setDropping(true)} />}
        {decisions(standing)}
      </Row>
    </Stack>
  );

  const ends = stageEnds(shown.content.stages);
  const cold = shown.prediction.cold.breakthrough;
  const throughStage = cold.kind === 'ok' ? ends.findIndex((end) => cold.value <= end + 1e-9) : -1;
  const throughIn = (index: number): string | null => {
    if (cold.kind !== 'ok' || index !== throughStage || shown.behind) return null;
    const start = (ends[index] ?? 0) - (shown.content.stages[index]?.duration ?? 0);
    return revisionText.throughHere(cold.value - start);
  };

  const edit: SectionEdit | null =
    readOnly || live.behind || !profile || !nozzle
      ? null
      : {
          profile,
          nozzle,
          onStages: (change, field) => dispatch({ do: 'stages', change, field }),
          onSettle: () => dispatch({ do: 'settle' }),
          onChoose: setChosen,
        };
  const depths = depthsAtEnds(shown.prediction, shown.content);
  const resultsOf = (index: number): StageResults | null => {
    const depth = depths[index];
    if (depth === undefined || shown.behind) return null;
    const { eruption, stall } = stageResults(shown.prediction, index);
    return { depth, eruption, stall: stall?.time ?? null };
  };

  const bar = (
    <StepBar
      steps={readOnly ? null : steps}
      dispatch={dispatch}
      proposing={proposing}
      onPropose={() => setProposing(!proposing)}
      former={former}
      comparing={comparing}
      onCompare={setComparing}
      now={shown.prediction}
    />
  );
  const proposePanel = proposing && !readOnly && (
    <ProposePanel
      ground={proposal.ground}
      rules={rules}
      stages={draft.content.stages}
      stageKeys={draft.stageKeys}
      state={proposal.state}
      proposed={proposal.proposed}
      now={shown.prediction}
      onBegin={proposal.begin}
      onCancel={proposal.clear}
      onAccept={(stages) => {
        dispatch({ do: 'stages', change: () => stages });
        proposal.clear();
        setProposing(false);
      }}
      onClose={() => {
        proposal.clear();
        setProposing(false);
      }}
    />
  );
  const sensitivity = profile && nozzle && !shown.behind && (
    <SensitivityPanel content={shown.content} profile={profile} nozzle={nozzle} rules={rules} />
  );

  const section = (
    <Stack gap="s">
      {shown.behind && (
        <Notice kind="plain" live>
          {revisionText.behind}
        </Notice>
      )}
      <SectionPanel
        live={shown}
        content={draft.content}
        machine={machine && machineRevision ? { name: machine.name, revisionNumber: machineRevision.number } : null}
        nozzle={nozzle}
        chosen={chosen}
        ghosts={ghosts}
        edit={edit}
        rules={rules}
      />
    </Stack>
  );
  const stages = (
    <Panel title={revisionText.stages}>
      {draft.content.stages.map((stage, index) => (
        <Stack key={draft.stageKeys[index]} gap="s">
          {index > 0 && <Divider />}
          <StageSentence
            index={index}
            stage={stage}
            through={throughIn(index)}
            results={resultsOf(index)}
            onExplain={(name) => setExplained({ name, stage: index })}
            onChoose={() => setChosen(index)}
          />
        </Stack>
      ))}
    </Panel>
  );
  const checks = (
    <>
      <Panel title={revisionText.checks}>
        <CheckList checks={shown.prediction.checks} />
      </Panel>
      <Panel title={houseRulesText.title}>
        <LiveHouseRules revision={revision} content={draft.content} dirty={dirty} sound={problems.size === 0} />
      </Panel>
    </>
  );
  const conditions = (
    <>
      <Panel title={revisionText.goodFor}>
        <GoodFor />
      </Panel>
      <Panel title={revisionText.cut}>
        <CutSentence />
      </Panel>
      <Panel title={revisionText.cornerRules}>
        <CornerRulesSentence />
      </Panel>
    </>
  );
  const history = (
    <Panel title={revisionText.history}>
      <Small>
        {revisionText.by(revision.touchedBy.map(({ name }) => name).join(', '), momentText(revision.changedAt))}
      </Small>
      <History revision={revision} />
    </Panel>
  );
  return (
    <DraftProvider value={{ draft, dispatch, problems, readOnly, scale: machineRevision?.profile.focusScale ?? null }}>
      {/* whoever leaves a field has finished a step */}
      <View onBlur={() => dispatch({ do: 'settle' })}>
        {wide ? (
          <Row align="flex-start" wrap={false} gap="xl">
            <Cell grow={5}>
              <Stack gap="l">
                {bar}
                {section}
                {checks}
                {sensitivity}
                {conditions}
                <EstimateNote />
              </Stack>
            </Cell>
            <Cell grow={4}>
              <Stack gap="l">
                {saveBar || decisions(standing)}
                {proposePanel}
                {stages}
                {history}
              </Stack>
            </Cell>
          </Row>
        ) : (
          <Stack gap="l">
            {readOnly && decisions(standing)}
            {bar}
            {proposePanel}
            {section}
            {checks}
            {stages}
            {sensitivity}
            {conditions}
            {history}
            <EstimateNote />
            {!readOnly && <StickyBar>{saveBar}</StickyBar>}
          </Stack>
        )}
      </View>
      <ExplainDialog
        explained={explained}
        from={{ prediction: shown.prediction, content: shown.content, nozzle, rules, system }}
        onClose={() => setExplained(null)}
      />
      <Dialog
        title={revisionText.dropTitle}
        open={dropping}
        onClose={() => setDropping(false)}
        actions={
          <Button
            kind="main"
            label={revisionText.drop}
            onPress={() => {
              setDropping(false);
              setBase({ version: revision.version, content: revision.content });
              dispatch({ do: 'load', content: revision.content });
              save.reset();
            }}
          />
        }
      >
        <Body>{revisionText.dropMeaning}</Body>
      </Dialog>
    </DraftProvider>
  );
}

/** What must stay at hand on a phone, above the page's lower edge. */
function StickyBar({ children }: { children: ReactNode }) {
  return (
    <View dataSet={{ print: 'hide' }} style={styles.sticky}>
      {children}
    </View>
  );
}

const styles = StyleSheet.create({
  sticky: {
    zIndex: 5,
    paddingVertical: space.m,
    borderTopWidth: 1,
    borderTopColor: roles.ink,
    backgroundColor: roles.ground,
    ...webStyle({ position: 'sticky', bottom: 0 }),
  },
});

import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { View } from 'react-native';
import { newId } from '@/components/data/call.ts';
import {
  houseRulesQuery,
  useHouseRuleAdd,
  useHouseRuleChange,
  useHouseRuleEnd,
} from '@/components/data/house-rules.ts';
import { isProblem } from '@/components/data/problem.ts';
import { Page } from '@/components/shell/page.tsx';
import { houseRulesText } from '@/components/text/house-rules.ts';
import { momentText } from '@/components/text/moments.ts';
import { Button } from '@/components/ui/button.tsx';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { Dialog } from '@/components/ui/dialog.tsx';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Rows } from '@/components/ui/link-row.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import type { HouseRule } from '@/shared/house-rules.ts';
import { blankRule, HouseRuleForm } from './house-rule-form.tsx';
import { RatesPanel } from './rates-panel.tsx';

type Doing =
  | { readonly what: 'add' }
  | { readonly what: 'change'; readonly rule: HouseRule }
  | { readonly what: 'end'; readonly rule: HouseRule };

/** What this plant asks of every pierce, for the lead to write. */
export function HouseRulesScreen() {
  const rules = useQuery(houseRulesQuery());
  const [doing, setDoing] = useState<Doing | null>(null);
  const inForce = rules.data?.filter(({ endedAt }) => endedAt === null) ?? [];
  const ended = rules.data?.filter(({ endedAt }) => endedAt !== null) ?? [];
  const done = () => setDoing(null);
  /** The rule as it stands on the server. */
  const newest = async ({ id }: HouseRule) => (await rules.refetch()).data?.find((rule) => rule.id === id) ?? null;
  const add = <Button kind="main" label={houseRulesText.add} onPress={() => setDoing({ what: 'add' })} />;

  return (
    <Page title={houseRulesText.title} actions={doing?.what === 'add' ? undefined : add}>
      <Body>{houseRulesText.words}</Body>
      {doing?.what === 'add' ? <RuleAdd onDone={done} /> : null}
      {doing?.what === 'change' ? (
        <RuleChange key={doing.rule.id} rule={doing.rule} newest={newest} onDone={done} />
      ) : null}
      {rules.isPending ? (
        <Progress label={houseRulesText.fetching} />
      ) : rules.data === undefined ? (
        <ErrorNotice error={rules.error} onRetry={() => void rules.refetch()} />
      ) : inForce.length === 0 ? (
        <Empty title={houseRulesText.empty.title}>{houseRulesText.empty.words}</Empty>
      ) : (
        <Rows label={houseRulesText.list}>
          {inForce.map((rule) => (
            <RuleRow key={rule.id} rule={rule} onDo={(what) => setDoing({ what, rule })} />
          ))}
        </Rows>
      )}
      {ended.length === 0 ? null : (
        <Stack>
          <Heading level={2}>{houseRulesText.ended}</Heading>
          <Rows label={houseRulesText.ended}>
            {ended.map((rule) => (
              <EndedRow key={rule.id} rule={rule} />
            ))}
          </Rows>
        </Stack>
      )}
      {rules.data === undefined ? null : <RatesPanel />}
      {doing?.what === 'end' ? (
        <RuleEndDialog key={doing.rule.id} rule={doing.rule} newest={newest} onDone={done} />
      ) : null}
    </Page>
  );
}

function RuleRow({ rule, onDo }: { readonly rule: HouseRule; readonly onDo: (what: 'change' | 'end') => void }) {
  return (
    <View style={{ paddingVertical: 12, paddingHorizontal: 4 }}>
      <Row justify="space-between" align="flex-start">
        <Cell least={280}>
          <Stack gap="hair">
            <Body strong>{rule.sentence}</Body>
            <Body>{rule.expression}</Body>
            <Small>{rule.blocks ? houseRulesText.blocks : houseRulesText.loose}</Small>
            <Small>
              {rule.changedBy === null
                ? houseRulesText.founded
                : houseRulesText.version(rule.version, rule.changedBy.name, momentText(rule.changedAt))}
            </Small>
          </Stack>
        </Cell>
        <Row gap="s">
          <Button
            label={houseRulesText.change}
            spoken={houseRulesText.changeOf(rule.sentence)}
            onPress={() => onDo('change')}
          />
          <Button
            kind="quiet"
            label={houseRulesText.end}
            spoken={houseRulesText.endOf(rule.sentence)}
            onPress={() => onDo('end')}
          />
        </Row>
      </Row>
    </View>
  );
}

function EndedRow({ rule }: { readonly rule: HouseRule }) {
  return (
    <View style={{ paddingVertical: 12, paddingHorizontal: 4 }}>
      <Stack gap="hair">
        <Body>{rule.sentence}</Body>
        <Body tone="softInk">{rule.expression}</Body>
        {rule.changedBy === null || rule.endedAt === null ? null : (
          <Small>{houseRulesText.endedBy(rule.changedBy.name, momentText(rule.endedAt))}</Small>
        )}
      </Stack>
    </View>
  );
}

function RuleAdd({ onDone }: { readonly onDone: () => void }) {
  const add = useHouseRuleAdd();
  const [id] = useState(newId);
  return (
    <Panel title={houseRulesText.add}>
      <HouseRuleForm
        label={houseRulesText.add}
        start={blankRule}
        action={houseRulesText.add}
        busy={add.isPending}
        error={add.error}
        onSubmit={(text, onError) => add.mutate({ id, ...text }, { onSuccess: onDone, onError })}
        onCancel={onDone}
      />
    </Panel>
  );
}

type OneRule = {
  readonly rule: HouseRule;
  readonly newest: (rule: HouseRule) => Promise<HouseRule | null>;
  readonly onDone: () => void;
};

function RuleChange({ rule, newest, onDone }: OneRule) {
  const change = useHouseRuleChange();
  // The version that was seen when the writing began, whatever the list behind has fetched since.
  const [seen, setSeen] = useState(rule);
  const { expression, sentence, blocks } = rule;
  return (
    <Panel title={houseRulesText.changing}>
      <HouseRuleForm
        label={houseRulesText.changing}
        start={{ expression, sentence, blocks }}
        action={houseRulesText.save}
        busy={change.isPending}
        error={change.error}
        onSubmit={(text, onError) => change.mutate({ rule: seen, text }, { onSuccess: onDone, onError })}
        onCancel={onDone}
        onLoadNewest={() =>
          void newest(rule).then((now) => {
            if (now !== null) setSeen(now);
            change.reset();
          })
        }
      />
    </Panel>
  );
}

function RuleEndDialog({ rule, newest, onDone }: OneRule) {
  const end = useHouseRuleEnd();
  const [seen, setSeen] = useState(rule);
  return (
    <Dialog
      title={houseRulesText.endTitle}
      open
      onClose={onDone}
      actions={
        <Button
          kind="main"
          label={houseRulesText.endNow}
          busy={end.isPending}
          onPress={() => end.mutate(seen, { onSuccess: onDone })}
        />
      }
    >
      <Body strong>{seen.sentence}</Body>
      <Body>{seen.expression}</Body>
      <Body>{houseRulesText.endWords}</Body>
      {!end.isError ? null : isProblem(end.error, 'stale') ? (
        <ConflictNotice
          onLoad={() =>
            void newest(rule).then((now) => {
              if (now !== null) setSeen(now);
              end.reset();
            })
          }
        />
      ) : (
        <ErrorNotice error={end.error} />
      )}
    </Dialog>
  );
}

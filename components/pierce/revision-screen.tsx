import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'expo-router';
import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import {
  revisionQuery,
  useRevisionApprove,
  useRevisionReturn,
  useRevisionSubmit,
  useRevisionWithdraw,
} from '@/components/data/revisions.ts';
import { strategyQuery, useDraftBegin } from '@/components/data/strategies.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { revisionText } from '@/components/text/pierce.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { ButtonLink, TextLink } from '@/components/ui/link.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';
import { can, may, type Actor } from '@/shared/policy.ts';
import type { Revision } from '@/shared/strategies.ts';
import { DecisionDialog, type Decision } from './decision-dialog.tsx';
import { RevisionEditor, type DraftStanding } from './revision-editor.tsx';
import { StateMark } from './state-mark.tsx';

/** One revision: the pierce designer while it is a draft, the reviewed numbers after. */
export function RevisionScreen({ id }: { id: string }) {
  const actor = useActor();
  const revision = useQuery(revisionQuery(id));

  if (revision.data && actor) {
    return (
      <Page title={revision.data.strategyName} eyebrow={revisionText.eyebrow}>
        <Row justify="space-between">
          <StateMark state={revision.data.state} detail={revisionText.number(revision.data.number)} />
          <Body>
            <TextLink href={`/strategies/${revision.data.strategyId}`}>{revisionText.strategyLink}</TextLink>
          </Body>
        </Row>
        <RevisionEditor
          revision={revision.data}
          userId={actor.userId}
          mayWrite={may(actor, 'strategy.write')}
          refetch={async () => (await revision.refetch()).data ?? null}
          decisions={(draft) => <Decisions revision={revision.data} actor={actor} draft={draft} />}
        />
      </Page>
    );
  }
  return (
    <Page title={revisionText.eyebrow}>
      {revision.isError ? (
        <ErrorNotice error={revision.error} onRetry={() => void revision.refetch()} />
      ) : (
        <Progress label={common.loading} />
      )}
    </Page>
  );
}

type DecisionsProps = { revision: Revision; actor: Actor; draft: DraftStanding };

/** What may be decided now, by whoever looks at it. */
function Decisions({ revision, actor, draft }: DecisionsProps) {
  const [decision, setDecision] = useState<Decision | null>(null);
  const mutations = {
    submit: useRevisionSubmit(),
    approve: useRevisionApprove(),
    giveBack: useRevisionReturn(),
    withdraw: useRevisionWithdraw(),
  };
  const current = decision === null ? null : mutations[decision];
  const touchedBy = revision.touchedBy.map((person) => person.id);
  const verdict = can(actor, 'review.decide', { touchedBy });
  const decide = async (which: Decision, words: string) => {
    const seen = which === 'submit' ? await draft.saved() : revision;
    if (!seen) return setDecision(null); // why is said beside the save button
    mutations[which].mutate({ revision: seen, words }, { onSuccess: () => setDecision(null) });
  };
  const open = (which: Decision) => {
    mutations[which].reset();
    setDecision(which);
  };

  return (
    <Stack gap="m">
      <Row>
        {revision.state === 'draft' && may(actor, 'strategy.write') && (
          <Button
            kind={draft.dirty ? 'plain' : 'main'}
            label={revisionText.submit}
            disabled={!draft.sound}
            onPress={() => open('submit')}
          />
        )}
        {revision.state === 'inReview' && verdict.ok && (
          <>
            <Button kind="main" label={revisionText.approve} onPress={() => open('approve')} />
            <Button label={revisionText.giveBack} onPress={() => open('giveBack')} />
          </>
        )}
        {revision.state === 'approved' && may(actor, 'review.decide') && (
          <Button label={revisionText.withdraw} onPress={() => open('withdraw')} />
        )}
        {revision.state !== 'draft' && revision.state !== 'inReview' && may(actor, 'strategy.write') && (
          <NextDraft revision={revision} />
        )}
      </Row>
      {revision.state === 'inReview' && !verdict.ok && (
        <Notice kind="plain" title={revisionText.waiting}>
          {verdict.why}
        </Notice>
      )}
      <DecisionDialog
        key={decision ?? 'none'}
        decision={decision}
        busy={current?.isPending ?? false}
        error={current?.error ?? null}
        onDecide={(which, words) => void decide(which, words)}
        onClose={() => setDecision(null)}
      />
    </Stack>
  );
}

/** The way on from a revision that can't be changed: the draft there is already, or a new one. */
function NextDraft({ revision }: { revision: Revision }) {
  const router = useRouter();
  const strategy = useQuery(strategyQuery(revision.strategyId));
  const begin = useDraftBegin();
  const [id] = useState(newId);
  if (!strategy.data) return null;
  const draft = strategy.data.revisions.find((other) => other.state === 'draft');
  if (draft) return <ButtonLink href={`/revisions/${draft.id}`} label={revisionText.openDraft(draft.number)} />;
  return (
    <Stack gap="s">
      <Button
        label={revisionText.begin}
        busy={begin.isPending}
        onPress={() =>
          begin.mutate(
            {
              strategyId: revision.strategyId,
              version: strategy.data.version,
              body: { id, fromRevisionId: revision.id },
            },
            { onSuccess: (made) => router.push(`/revisions/${made.id}`) },
          )
        }
      />
      {begin.isError && <ErrorNotice error={begin.error} />}
    </Stack>
  );
}

import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useForm, useWatch } from 'react-hook-form';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { houseRuleReadingQuery } from '@/components/data/house-rules.ts';
import { isProblem } from '@/components/data/problem.ts';
import { common } from '@/components/text/common.ts';
import { houseRulesText } from '@/components/text/house-rules.ts';
import { Button } from '@/components/ui/button.tsx';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { FormText, FormTick } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Cell, Row } from '@/components/ui/stack.tsx';
import { houseRuleTextSchema, type HouseRule, type HouseRuleReading } from '@/shared/house-rules.ts';
import { HouseRuleNames } from './house-rule-names.tsx';
import { useSettled } from './use-settled.ts';

export type HouseRuleText = Pick<HouseRule, 'expression' | 'sentence' | 'blocks'>;

export const blankRule: HouseRuleText = { expression: '', sentence: '', blocks: false };

/** A rule's words: the expression is read by the server as one types, and tried on the revision changed last. */
export function HouseRuleForm({
  label,
  start,
  action,
  busy,
  error,
  onSubmit,
  onCancel,
  onLoadNewest,
}: {
  readonly label: string;
  readonly start: HouseRuleText;
  readonly action: string;
  readonly busy: boolean;
  readonly error: unknown;
  readonly onSubmit: (text: HouseRuleText, onError: (error: unknown) => void) => void;
  readonly onCancel: () => void;
  /** Where somebody else may have changed it meanwhile. */
  readonly onLoadNewest?: () => void;
}) {
  const form = useForm({ resolver: zodResolver(houseRuleTextSchema), mode: 'onTouched', defaultValues: start });
  const expression = useWatch({ control: form.control, name: 'expression' });
  const expressionError = form.formState.errors.expression;
  const settled = useSettled(expression.trim(), 250);
  const reading = useQuery({ ...houseRuleReadingQuery(settled), enabled: settled !== '' });
  const pick = (name: string) => {
    const before = form.getValues('expression');
    const gap = before === '' || /\s$/.test(before) ? '' : ' ';
    form.setValue('expression', `${before}${gap}${name} `, { shouldDirty: true });
    form.setFocus('expression');
  };
  const hint =
    settled === ''
      ? houseRulesText.fields.expressionHint
      : reading.isError
        ? houseRulesText.unread
        : reading.data === undefined
          ? houseRulesText.reading
          : readingWords(reading.data);

  return (
    <Row align="flex-start" gap="xl">
      <Cell least={320} grow={2}>
        <Form
          label={label}
          onSubmit={form.handleSubmit((text) =>
            onSubmit(text, (failure) => {
              applyFieldProblems(failure, form.setError);
            }),
          )}
        >
          <FormText
            control={form.control}
            name="expression"
            label={houseRulesText.fields.expression}
            // said once: an error on the field is the same reason
            hint={expressionError !== undefined && reading.data?.kind !== 'ok' ? undefined : hint}
            autoCapitalize="none"
          />
          <FormText
            control={form.control}
            name="sentence"
            rows={2}
            label={houseRulesText.fields.sentence}
            hint={houseRulesText.fields.sentenceHint}
          />
          <FormTick
            control={form.control}
            name="blocks"
            label={houseRulesText.fields.blocks}
            hint={houseRulesText.fields.blocksHint}
          />
          {error === null ? null : isProblem(error, 'stale') && onLoadNewest !== undefined ? (
            <ConflictNotice onLoad={onLoadNewest} />
          ) : (
            <ErrorNotice error={error} />
          )}
          <Row>
            <Button kind="main" label={action} submit busy={busy} />
            <Button label={common.cancel} onPress={onCancel} />
          </Row>
        </Form>
      </Cell>
      <Cell least={320} grow={3}>
        <HouseRuleNames onPick={pick} />
      </Cell>
    </Row>
  );
}

function readingWords(reading: HouseRuleReading): string {
  if (reading.kind === 'none') return reading.why;
  const { example } = reading;
  if (example === null) return houseRulesText.understood;
  return `${houseRulesText.understood} ${houseRulesText.tried(houseRulesText.newest, example.state, example.why)}`;
}

import { useRouter } from 'expo-router';
import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { useReportAdd } from '@/components/data/reports.ts';
import { Page } from '@/components/shell/page.tsx';
import { reportText } from '@/components/text/card.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { fits, PhotoPicker } from '@/components/ui/file-picker.tsx';
import { Form } from '@/components/ui/form.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { limits } from '@/shared/limits.ts';
import { troubleKinds } from '@/shared/reports.ts';

type ReportNewScreenProps = {
  revisionId: string;
  machineId: string;
  plateId?: string | null;
  /** µm */
  thickness?: number | null;
};

/** It went wrong: what happened, in words, with a picture. A lost connection keeps all of it. */
export function ReportNewScreen({ revisionId, machineId, plateId = null, thickness = null }: ReportNewScreenProps) {
  const router = useRouter();
  const add = useReportAdd();
  const [id] = useState(newId);
  const [kind, setKind] = useState<(typeof troubleKinds)[number] | null>(null);
  const [words, setWords] = useState('');
  const [photo, setPhoto] = useState<File | null>(null);
  const [sent, setSent] = useState(false);

  if (add.isSuccess) {
    return (
      <Page title={reportText.sent} measure="reading">
        <Notice kind="ok" large live>
          {reportText.sentHint}
        </Notice>
        {router.canGoBack() && <Button size="gloved" fill label={reportText.back} onPress={() => router.back()} />}
        <ButtonLink size="large" fill href="/at-the-machine" label={reportText.another} />
      </Page>
    );
  }
  const send = () => {
    setSent(true);
    if (kind === null || (photo && !fits(photo, limits.photoBytes))) return;
    add.mutate({ body: { id, revisionId, machineId, plateId, thickness, kind, words }, photo });
  };
  return (
    <Page title={reportText.title} measure="reading">
      <Form onSubmit={send} label={reportText.title}>
        <Choice
          large
          kind="radios"
          label={reportText.kind}
          options={troubleKinds.map((value) => ({ value, label: reportText.kinds[value] }))}
          value={kind}
          onChange={setKind}
          error={sent && kind === null ? reportText.chooseKind : undefined}
        />
        <TextField large optional rows={3} label={reportText.words} value={words} onChange={setWords} />
        <PhotoPicker
          optional
          label={reportText.photo}
          file={photo}
          onChange={setPhoto}
          maxBytes={limits.photoBytes}
          tooLarge={reportText.tooLarge}
        />
        {add.isError && <ErrorNotice error={add.error} />}
        <Button kind="main" size="gloved" fill submit label={reportText.send} busy={add.isPending} />
      </Form>
    </Page>
  );
}

import { useRouter } from 'expo-router';
import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { useLayoutAdd } from '@/components/data/layouts.ts';
import { Page } from '@/components/shell/page.tsx';
import { layoutsText } from '@/components/text/layouts.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { SettingsForm } from './settings-form.tsx';

/** Begins a layout: its plate, still empty. */
export function LayoutNewScreen() {
  const add = useLayoutAdd();
  const router = useRouter();
  const [id] = useState(newId);
  return (
    <Page title={layoutsText.new} measure="reading">
      <SettingsForm
        start={null}
        main
        action={layoutsText.begin}
        busy={add.isPending}
        error={add.isError ? <ErrorNotice error={add.error} /> : null}
        onUse={(settings) =>
          add.mutate(
            { id, ...settings, placements: [], order: null },
            { onSuccess: (layout) => router.replace(`/layouts/${layout.id}`) },
          )
        }
      />
    </Page>
  );
}

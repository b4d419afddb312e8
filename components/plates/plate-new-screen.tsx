import { useRouter } from 'expo-router';
import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { usePlateAdd } from '@/components/data/plates.ts';
import { Page } from '@/components/shell/page.tsx';
import { platesText } from '@/components/text/plates.ts';
import { blankPlate, PlateForm } from './plate-form.tsx';

/** Books a plate in. */
export function PlateNewScreen() {
  const add = usePlateAdd();
  const router = useRouter();
  const [id] = useState(newId);
  return (
    <Page title={platesText.add} measure="reading">
      <PlateForm
        start={blankPlate}
        action={platesText.book}
        error={add.error}
        busy={add.isPending}
        onSubmit={(given) =>
          add.mutate({ id, ...given }, { onSuccess: (plate) => router.replace(`/plates/${plate.id}`) })
        }
      />
    </Page>
  );
}

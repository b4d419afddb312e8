import type { ErrorBoundaryProps } from 'expo-router';
import { View } from 'react-native';
import { common } from '@/components/text/common.ts';
import { Button } from '@/components/ui/button.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Body } from '@/components/ui/text.tsx';
import { Page } from './page.tsx';

/** A page that failed says so, and can be tried again; the rest of the product stays. */
export function ErrorBoundary({ error, retry }: ErrorBoundaryProps) {
  return (
    <Page title={common.unknown.title} measure="reading">
      <Notice kind="wrong" live>
        <Body>{common.unknown.detail}</Body>
        <Body tone="softInk">{error.message}</Body>
      </Notice>
      <View style={{ alignItems: 'flex-start' }}>
        <Button label={common.retry} onPress={() => void retry()} />
      </View>
    </Page>
  );
}

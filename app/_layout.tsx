import { QueryClientProvider } from '@tanstack/react-query';
import { useFonts } from 'expo-font';
import { Slot } from 'expo-router';
import { useState } from 'react';
import { createQueryClient } from '@/components/data/client.ts';
import { Frame } from '@/components/shell/frame.tsx';
import { fonts } from '@/components/theme/fonts.ts';

export { ErrorBoundary } from '@/components/shell/error-boundary.tsx';

export default function Layout() {
  const [client] = useState(createQueryClient);
  useFonts(fonts); // nothing waits for them: words are read in the system's letters until then
  return (
    <QueryClientProvider client={client}>
      <Frame>
        <Slot />
      </Frame>
    </QueryClientProvider>
  );
}

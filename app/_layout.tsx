import { QueryClientProvider } from '@tanstack/react-query';
import { useFonts } from 'expo-font';
import { Slot } from 'expo-router';
import { createQueryClient } from '@/components/data/client.ts';
import { Frame } from '@/components/shell/frame.tsx';
import { fonts } from '@/components/theme/fonts.ts';

export { ErrorBoundary } from '@/components/shell/error-boundary.tsx';

/** One for the page's life and not for the layout's: the browser's forward button lays everything out anew. */
const client = createQueryClient();

export default function Layout() {
  useFonts(fonts); // nothing waits for them: words are read in the system's letters until then
  return (
    <QueryClientProvider client={client}>
      <Frame>
        <Slot />
      </Frame>
    </QueryClientProvider>
  );
}

import { shell } from '@/components/text/shell.ts';
import { ButtonLink } from '@/components/ui/link.tsx';
import { Empty } from '@/components/ui/empty.tsx';
import { Page } from './page.tsx';

/** For an address that leads nowhere. It doesn't repeat the address: the exported page doesn't know it. */
export function NothingHere() {
  return (
    <Page title={shell.nothing.title} measure="reading">
      <Empty title={shell.nothing.words} action={<ButtonLink href="/" label={shell.nothing.start} />} />
    </Page>
  );
}

import { useExpired } from '@/components/data/expiry.ts';
import { shell } from '@/components/text/shell.ts';
import { Dialog } from '@/components/ui/dialog.tsx';
import { Body } from '@/components/ui/text.tsx';
import type { Session } from '@/shared/sessions.ts';
import { SignInForm } from './sign-in-form.tsx';

/** The sign-in ended at work: it is asked for again over the page, so that nothing typed below is lost. */
export function ExpiredDialog({ session }: { readonly session: Session }) {
  const expired = useExpired();
  return (
    <Dialog title={shell.expired.title} open={expired} closable={false} onClose={() => undefined}>
      <Body>{shell.expired.words}</Body>
      <SignInForm
        mail={session.user.mail}
        onDone={(next) => {
          // Does somebody else sign in, or in another plant? Then nothing of the page behind is theirs.
          if (next.user.id !== session.user.id || next.plant.id !== session.plant.id) window.location.assign('/');
        }}
      />
    </Dialog>
  );
}

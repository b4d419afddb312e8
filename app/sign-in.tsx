import { Title, useTextParam } from '@/components/shell/route.tsx';
import { SignInScreen } from '@/components/shell/sign-in-screen.tsx';
import { titles } from '@/components/text/shell.ts';

export default function SignIn() {
  const next = useTextParam('next');
  return (
    <>
      <Title text={titles.signIn} />
      <SignInScreen next={next} />
    </>
  );
}

import { NothingHere } from '@/components/shell/nothing-here.tsx';
import { Title } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function NotFound() {
  return (
    <>
      <Title text={titles.notFound} />
      <NothingHere />
    </>
  );
}

import { PeopleScreen } from '@/components/people/people-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function People() {
  return (
    <Route title={titles.people} action="people.manage">
      <PeopleScreen />
    </Route>
  );
}

import { AtTheMachineScreen } from '@/components/card/at-the-machine-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function AtTheMachine() {
  return (
    <Route title={titles.atTheMachine} action="card.read">
      <AtTheMachineScreen />
    </Route>
  );
}

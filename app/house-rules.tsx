import { HouseRulesScreen } from '@/components/rules/house-rules-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function HouseRules() {
  return (
    <Route title={titles.houseRules} action="rule.write">
      <HouseRulesScreen />
    </Route>
  );
}

import { useState } from 'react';
import { View } from 'react-native';
import { cardText } from '@/components/text/card.ts';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import { Heading } from '@/components/ui/text.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Card } from '@/shared/cards.ts';
import { highestPressure } from './card-figures.ts';

/** What must be true first. A reminder at the machine, not a lock: the numbers are readable before. */
export function CardChecks({ match }: { match: Extract<Card['match'], { kind: 'approved' }> }) {
  const system = useUnitSystem();
  const [ticked, setTicked] = useState<readonly string[]>([]);
  const { checks } = cardText;
  const items = [
    checks.nozzle(match.nozzle, system),
    checks.window,
    checks.focus,
    checks.temperature(match.hottestPlate, system),
    checks.extraction,
    checks.oxygen(highestPressure(match), system),
  ];
  return (
    <View
      role="group"
      aria-label={cardText.before}
      style={{
        borderWidth: 2,
        borderColor: roles.ink,
        borderRadius: 3,
        padding: space.m,
        backgroundColor: roles.sheet,
      }}
    >
      <Heading level={2}>{cardText.before}</Heading>
      {items.map((item) => (
        <Tick
          key={item}
          large
          label={item}
          checked={ticked.includes(item)}
          onChange={(on) => setTicked(on ? [...ticked, item] : ticked.filter((other) => other !== item))}
        />
      ))}
    </View>
  );
}

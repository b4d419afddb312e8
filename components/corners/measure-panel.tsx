import { View } from 'react-native';
import { measured, type Snap } from '@/components/parts/measure.ts';
import { measureText } from '@/components/text/corner-preview.ts';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { quantityText } from '@/strategy/units/index.ts';

/** What was measured, in the person's own units; before that, what to do next. */
export function MeasurePanel({ places }: { places: readonly Snap[] }) {
  const system = useUnitSystem();
  const [first, second] = places;
  const text = (metres: number) => quantityText(metres, 'length', system).text;
  const found = first && second ? measured(first.at, second.at) : null;
  return (
    <View aria-live="polite" style={{ gap: 8 }}>
      {found && first && second && (
        <Sheet
          label={measureText.toggle}
          cells={[
            { label: measureText.distance, value: text(found.distance) },
            { label: measureText.across, value: text(found.dx) },
            { label: measureText.up, value: text(found.dy) },
            {
              label: measureText.between,
              value: measureText.ends(measureText.snap[first.kind], measureText.snap[second.kind]),
              share: 2,
            },
          ]}
        />
      )}
      <Small>
        {found
          ? measureText.again
          : first
            ? `${measureText.from(measureText.snap[first.kind])}. ${measureText.second}`
            : measureText.first}
      </Small>
    </View>
  );
}

import { useId } from 'react';
import { View } from 'react-native';
import Svg, { Defs, LinearGradient, Path, Rect, Stop } from 'react-native-svg';
import { cornerText } from '@/components/text/corners.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { temperatureColour, temperatureStops, temperatureWord } from '@/components/theme/temperature.ts';
import { Row } from '@/components/ui/stack.tsx';
import { Figure, Label, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { kelvinFromCelsius, quantityText } from '@/strategy/units/index.ts';

const rowHeight = 66;

/** The one scale of temperature, from the steel's temper and glow; a step a name, with its figure; in two rows on a phone. */
export function TemperatureScale() {
  const system = useUnitSystem();
  const { wide } = useLayout();
  const named = temperatureStops.filter(({ celsius }) => celsius !== 200);
  return (
    <View role="group" aria-label={cornerText.scale}>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap' }}>
        {named.map((stop, index) => (
          <View
            key={stop.celsius}
            style={{ height: rowHeight, width: `${100 / (wide ? named.length : named.length / 2)}%` }}
          >
            <ScaleStep
              from={stop.colour}
              to={named[index + 1]?.colour ?? stop.colour}
              faint={index === 0}
              name={stop.name}
              figure={quantityText(kelvinFromCelsius(stop.celsius), 'temperature', system).text}
            />
          </View>
        ))}
      </View>
    </View>
  );
}

type ScaleStepProps = {
  from: string;
  to: string;
  /** Cold steel leaves the paper as it is, behind a drawing as well. */
  faint: boolean;
  name: string;
  figure: string;
};

function ScaleStep({ from, to, faint, name, figure }: ScaleStepProps) {
  const id = useId().replace(/\W/g, '');
  return (
    <>
      <Svg width="100%" height={16} aria-hidden>
        <Defs>
          <LinearGradient id={id}>
            <Stop offset="0" stopColor={from} stopOpacity={faint ? 0.15 : 1} />
            <Stop offset="1" stopColor={to} />
          </LinearGradient>
        </Defs>
        <Rect width="100%" height={16} fill={`url(#${id})`} />
        <Path d="M0.5 0V16" stroke={roles.ink} strokeWidth={1} />
      </Svg>
      <Figure value={figure} small />
      <Label>{name}</Label>
    </>
  );
}

/** A temperature with its place on the scale: swatch, figure; the colour's name is read aloud. */
export function TemperatureFigure({ kelvin, strong = true }: { kelvin: number; strong?: boolean }) {
  const system = useUnitSystem();
  return (
    <Row gap="s" wrap={false}>
      <Svg width={16} height={16} role="img" aria-label={temperatureWord(kelvin)} style={{ flexShrink: 0 }}>
        <Rect x={0.5} y={0.5} width={15} height={15} fill={temperatureColour(kelvin)} stroke={roles.ink} />
      </Svg>
      <Small strong={strong}>{quantityText(kelvin, 'temperature', system).text}</Small>
    </Row>
  );
}

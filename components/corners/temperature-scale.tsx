import { useId } from 'react';
import { View } from 'react-native';
import { cornerText } from '@/components/text/corners.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { temperatureColour, temperatureStops, temperatureWord } from '@/components/theme/temperature.ts';
import { family } from '@/components/theme/type.ts';
import { Row } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
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
      <div
        style={{
          display: 'grid',
          gridTemplateColumns: `repeat(${wide ? named.length : named.length / 2}, minmax(0, 1fr))`,
        }}
      >
        {named.map((stop, index) => (
          <ScaleStep
            key={stop.celsius}
            from={stop.colour}
            to={named[index + 1]?.colour ?? stop.colour}
            name={stop.name}
            figure={quantityText(kelvinFromCelsius(stop.celsius), 'temperature', system).text}
          />
        ))}
      </div>
    </View>
  );
}

function ScaleStep({ from, to, name, figure }: { from: string; to: string; name: string; figure: string }) {
  const id = useId().replace(/\W/g, '');
  return (
    <div style={{ height: rowHeight }}>
      <svg width="100%" height={16} aria-hidden="true" style={{ display: 'block' }}>
        <defs>
          <linearGradient id={id}>
            <stop offset="0" stopColor={from} />
            <stop offset="1" stopColor={to} />
          </linearGradient>
        </defs>
        <rect width="100%" height={16} fill={`url(#${id})`} />
        <path d="M0.5 0V16" stroke={roles.ink} strokeWidth={1} />
      </svg>
      <div style={{ fontFamily: family.figure, fontSize: 16, lineHeight: '20px', color: roles.ink }}>{figure}</div>
      <div style={{ fontFamily: family.label, fontSize: 14, lineHeight: '18px', color: roles.softInk }}>{name}</div>
    </div>
  );
}

/** A temperature with its place on the scale: swatch, figure; the colour's name is read aloud. */
export function TemperatureFigure({ kelvin, strong = true }: { kelvin: number; strong?: boolean }) {
  const system = useUnitSystem();
  return (
    <Row gap="s" wrap={false}>
      <svg width={16} height={16} role="img" aria-label={temperatureWord(kelvin)} style={{ flex: 'none' }}>
        <rect x={0.5} y={0.5} width={15} height={15} fill={temperatureColour(kelvin)} stroke={roles.ink} />
      </svg>
      <Small strong={strong}>{quantityText(kelvin, 'temperature', system).text}</Small>
    </Row>
  );
}

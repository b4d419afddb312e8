import Svg, { Path } from 'react-native-svg';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { PlainLink } from '@/components/ui/link.tsx';
import { Words } from '@/components/ui/words.tsx';
import { common } from '@/components/text/common.ts';

/** The core as the product's own mark: plate in section, three stages down the bore, the reserve running out below. */
export function BrandMark({ size = 30 }: { readonly size?: number }) {
  return (
    <Svg width={(size * 24) / 34} height={size} viewBox="0 0 24 34" aria-hidden>
      <Path d="M1 1H23V25H1Z" fill={roles.steelFill} />
      <Path
        d="M1 9 8 2M1 16 8 9M1 23 8 16M16 9 23 2M16 16 23 9M16 23 23 16"
        stroke={roles.steelLine}
        strokeWidth={1}
        fill="none"
      />
      <Path d="M8 1H16V8H8Z" fill={roles.ember} fillOpacity={0.35} />
      <Path d="M8.8 8H15.2V16H8.8Z" fill={roles.ember} fillOpacity={0.65} />
      <Path d="M9.6 16H14.4V25H9.6Z" fill={roles.ember} />
      <Path d="M1 1H8M16 1H23M1 1V25H8.6M15.4 25H23V1" stroke={roles.ink} strokeWidth={1.6} fill="none" />
      <Path d="M9 33 10.4 27M11.6 33 13 27M14.2 33 15.6 27" stroke={roles.ember} strokeWidth={1.5} />
    </Svg>
  );
}

export function Brand() {
  return (
    <PlainLink href="/" style={{ flexDirection: 'row', alignItems: 'center', gap: 10, minHeight: 48 }}>
      <BrandMark />
      <Words style={{ fontFamily: family.figure, fontSize: 23, lineHeight: 28, color: roles.ink }}>
        {common.product}
      </Words>
    </PlainLink>
  );
}

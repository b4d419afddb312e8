import { useState } from 'react';
import { Image, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { Notice } from './notice.tsx';

/** A picture at its own shape, as wide as there is room; a tap opens it whole. Says so when it cannot be fetched. */
export function Picture({
  address,
  width,
  height,
  words,
  lost,
}: {
  readonly address: string;
  /** px */
  readonly width: number;
  readonly height: number;
  /** What it shows, for who doesn't see it. */
  readonly words: string;
  readonly lost: string;
}) {
  const [failed, setFailed] = useState(false);
  if (failed) return <Notice kind="wrong">{lost}</Notice>;
  return (
    <View href={address} hrefAttrs={{ target: '_blank', rel: 'noreferrer' }}>
      <Image
        role="img"
        aria-label={words}
        source={{ uri: address }}
        onError={() => setFailed(true)}
        style={{ width: '100%', maxWidth: width, aspectRatio: width / height, backgroundColor: roles.steelFill }}
      />
    </View>
  );
}

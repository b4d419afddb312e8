import { FontDisplay, type FontResource } from 'expo-font';
import condensedMedium from '../../assets/fonts/BarlowCondensed_500Medium.ttf';
import condensedSemiBold from '../../assets/fonts/BarlowCondensed_600SemiBold.ttf';
import medium from '../../assets/fonts/Barlow_500Medium.ttf';
import regular from '../../assets/fonts/Barlow_400Regular.ttf';
import semiBold from '../../assets/fonts/Barlow_600SemiBold.ttf';

/** Text is readable in the system's letters until these have come. */
const swap = (uri: number): FontResource => ({ uri, display: FontDisplay.SWAP });

/** The shipped families, one a weight; names as in `type.ts`. */
export const fonts: Record<string, FontResource> = {
  'Barlow-Regular': swap(regular),
  'Barlow-Medium': swap(medium),
  'Barlow-SemiBold': swap(semiBold),
  'BarlowCondensed-Medium': swap(condensedMedium),
  'BarlowCondensed-SemiBold': swap(condensedSemiBold),
};

import sharp from 'sharp';
import { limits } from '../../shared/limits.ts';
import { AppError } from '../errors.ts';

export type Photo = {
  readonly bytes: Uint8Array;
  readonly width: number;
  readonly height: number;
  readonly contentType: 'image/jpeg';
};

/**
 * The picture made anew: upright, at most `limits.photoSide` px, and with nothing of what the phone wrote beside it (place, time,
 * owner). What it is, its first bytes say; a file's name and declared type are not asked.
 */
export async function photoFrom(bytes: Uint8Array): Promise<Photo> {
  const kind = kindOf(bytes);
  if (kind === 'heic') {
    throw new AppError(
      'bad-photo',
      'HEIC pictures can’t be read here. Set the phone’s camera to its most compatible format (JPEG), or send a screenshot.',
    );
  }
  if (kind === null)
    throw new AppError(
      'bad-photo',
      'The file is not a JPEG, PNG or WebP picture. Choose another, or send the words without one.',
    );
  try {
    const { data, info } = await sharp(bytes, { limitInputPixels: limits.photoPixels, failOn: 'error' })
      .rotate()
      .resize({ width: limits.photoSide, height: limits.photoSide, fit: 'inside', withoutEnlargement: true })
      .flatten({ background: '#ffffff' })
      .jpeg({ quality: 82 })
      .toBuffer({ resolveWithObject: true });
    return { bytes: data, width: info.width, height: info.height, contentType: 'image/jpeg' };
  } catch (error) {
    if (error instanceof Error && /pixel limit/i.test(error.message)) {
      throw new AppError(
        'bad-photo',
        `The picture has more than ${limits.photoPixels / 1e6} million pixels. Choose a smaller one, or send the words without one.`,
      );
    }
    throw new AppError(
      'bad-photo',
      'The picture is damaged and can’t be read. Choose another, or send the words without one.',
    );
  }
}

const ascii = (bytes: Uint8Array, from: number, to: number) => Buffer.from(bytes.subarray(from, to)).toString('latin1');

function kindOf(bytes: Uint8Array): 'jpeg' | 'png' | 'webp' | 'heic' | null {
  if (bytes[0] === 0xff && bytes[1] === 0xd8 && bytes[2] === 0xff) return 'jpeg';
  if (ascii(bytes, 0, 8) === '\x89PNG\r\n\x1a\n') return 'png';
  if (ascii(bytes, 0, 4) === 'RIFF' && ascii(bytes, 8, 12) === 'WEBP') return 'webp';
  // ISO base media with an image brand of the HEIF family (ISO/IEC 23008-12)
  if (ascii(bytes, 4, 8) === 'ftyp' && /^(heic|heix|hevc|hevx|heim|heis|mif1|msf1)$/.test(ascii(bytes, 8, 12)))
    return 'heic';
  return null;
}

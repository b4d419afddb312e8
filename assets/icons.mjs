// Draws the icons in public/ from core.svg: `node assets/icons.mjs`, after the mark was changed.
import fs from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';

const here = import.meta.dirname;
const mark = fs.readFileSync(path.join(here, 'core.svg'));
const publicFolder = path.join(here, '..', 'public');
const png = (size) =>
  sharp(mark, { density: 72 * (size / 32) })
    .resize(size, size)
    .png({ compressionLevel: 9 })
    .toBuffer();

/** A masked icon is cut to a circle or a squircle: the mark keeps to its middle. */
const maskable = async (size) => {
  const inner = Math.round(size * 0.7);
  const at = Math.round((size - inner) / 2);
  return sharp({ create: { width: size, height: size, channels: 4, background: '#EDE8DC' } })
    .composite([{ input: await png(inner), left: at, top: at }])
    .png({ compressionLevel: 9 })
    .toBuffer();
};

/** An .ico file: a directory of images, each here as PNG (as all browsers read it). */
const ico = (images) => {
  const header = Buffer.alloc(6 + 16 * images.length);
  header.writeUInt16LE(1, 2);
  header.writeUInt16LE(images.length, 4);
  let offset = header.length;
  images.forEach(({ size, data }, index) => {
    const at = 6 + 16 * index;
    header.writeUInt8(size, at);
    header.writeUInt8(size, at + 1);
    header.writeUInt16LE(1, at + 4);
    header.writeUInt16LE(32, at + 6);
    header.writeUInt32LE(data.length, at + 8);
    header.writeUInt32LE(offset, at + 12);
    offset += data.length;
  });
  return Buffer.concat([header, ...images.map((image) => image.data)]);
};

const write = (name, data) => fs.writeFileSync(path.join(publicFolder, name), data);
write('icon.svg', mark);
write('icon-192.png', await png(192));
write('icon-512.png', await png(512));
write('icon-maskable-512.png', await maskable(512));
write('apple-touch-icon.png', await png(180));
write(
  'favicon.ico',
  ico([
    { size: 16, data: await png(16) },
    { size: 32, data: await png(32) },
  ]),
);

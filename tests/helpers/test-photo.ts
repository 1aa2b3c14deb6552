import { randomBytes } from 'node:crypto';
import sharp from 'sharp';

type Wishes = {
  width?: number;
  height?: number;
  orientation?: number;
  format?: 'jpeg' | 'png' | 'webp' | 'gif';
};

/** A photo with a camera's metadata: a place and a turned sensor. */
export async function photoBytes(wishes: Wishes = {}): Promise<Buffer> {
  const { width = 400, height = 300, orientation, format = 'jpeg' } = wishes;
  const [r = 0, g = 0, b = 0] = randomBytes(3);
  const image = sharp({ create: { width, height, channels: 3, background: { r, g, b } } });
  return image
    .withExif({ IFD0: { Make: 'SecretCamera' }, IFD3: { GPSLatitude: '51/1 30/1 0/1' } })
    .withMetadata(orientation === undefined ? {} : { orientation })
    .toFormat(format)
    .toBuffer();
}

import sharp from 'sharp';

/** Larger ones are refused before they are decoded: a small file can stand for gigabytes of pixels. */
const MAX_PIXELS = 50_000_000;
const LONGEST_SIDE_PX = 2048;
const QUALITY = 82;
const formats = new Set(['jpeg', 'png', 'webp']);

// One picture at a time: rovers post on the same two cores.
sharp.concurrency(1);

export interface StoredImage {
  bytes: Buffer;
  width: number;
  height: number;
}

/** Why a file is no photo that can be kept, in words for whoever sent it. */
export class ImageError extends Error {}

/**
 * Judges a file by its content, whatever its name says, and makes of it a WebP picture of at most 2048 px, upright, without
 * any metadata (a camera writes into it where and when it was taken). Throws ImageError.
 */
export async function storedImage(file: Buffer): Promise<StoredImage> {
  const options = { limitInputPixels: MAX_PIXELS, failOn: 'truncated' } as const;
  const metadata = await sharp(file, { ...options, limitInputPixels: false })
    .metadata()
    .catch((cause: unknown) => {
      throw new ImageError('This is no JPEG, PNG or WebP picture.', { cause });
    });
  const { format, width, height, pages } = metadata;
  if (!formats.has(format) || (pages ?? 1) > 1) throw new ImageError('This is no JPEG, PNG or WebP picture.');
  if (width * height > MAX_PIXELS)
    throw new ImageError(
      `This picture is too large: ${width} by ${height} pixels, at most 50 million in all.`,
    );
  try {
    const { data, info } = await sharp(file, options)
      .autoOrient()
      .resize(LONGEST_SIDE_PX, LONGEST_SIDE_PX, { fit: 'inside', withoutEnlargement: true })
      .webp({ quality: QUALITY })
      .toBuffer({ resolveWithObject: true });
    return { bytes: data, width: info.width, height: info.height };
  } catch (cause) {
    throw new ImageError('This picture is damaged or cut short.', { cause });
  }
}

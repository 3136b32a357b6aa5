import { MAX_PHOTO_BYTES } from '@hubtack/contracts/lost-fixes/lost-fix.js';

/** Enough to see a cable or a tree line; a phone's full picture takes minutes on a weak signal. */
const LONGEST_EDGE_PX = 2560;
const WORTH_SHRINKING_BYTES = 2 * 1024 * 1024;
const SERVER_TAKES = ['image/jpeg', 'image/png', 'image/webp'];

/** A picture as it is sent: as it came when that is small enough, else smaller and as JPEG. Throws words for the person. */
export async function shrinkPhoto(file: File): Promise<Blob> {
  const picture = await createImageBitmap(file).catch((cause: unknown) => {
    throw new Error(`“${file.name}” cannot be read as a picture. Choose a JPEG, PNG or WebP.`, { cause });
  });
  try {
    const { width, height } = picture;
    const scale = Math.min(1, LONGEST_EDGE_PX / Math.max(width, height));
    if (scale === 1 && file.size <= WORTH_SHRINKING_BYTES && SERVER_TAKES.includes(file.type)) return file;
    const canvas = document.createElement('canvas');
    canvas.width = Math.max(1, Math.round(width * scale));
    canvas.height = Math.max(1, Math.round(height * scale));
    canvas.getContext('2d')?.drawImage(picture, 0, 0, canvas.width, canvas.height);
    const smaller = await new Promise<Blob | null>((resolve) => {
      canvas.toBlob(resolve, 'image/jpeg', 0.85);
    });
    if (!smaller || smaller.size > MAX_PHOTO_BYTES)
      throw new Error(`“${file.name}” is too large for this phone to make smaller. Choose another.`);
    return smaller;
  } finally {
    picture.close();
  }
}

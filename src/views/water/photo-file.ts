const LONGEST_SIDE = 1600;
const QUALITY = 0.82;

/** A photo as small as a slip needs to be read: phones take far larger ones. Left as it is where it can't be drawn. */
export async function smallerPhoto(file: File): Promise<File> {
  const picture = await createImageBitmap(file).catch(() => null);
  if (!picture) return file;
  const scale = Math.min(1, LONGEST_SIDE / Math.max(picture.width, picture.height));
  const canvas = document.createElement('canvas');
  canvas.width = Math.round(picture.width * scale);
  canvas.height = Math.round(picture.height * scale);
  canvas.getContext('2d')?.drawImage(picture, 0, 0, canvas.width, canvas.height);
  picture.close();
  const blob = await new Promise<Blob | null>((resolve) => {
    canvas.toBlob(resolve, 'image/jpeg', QUALITY);
  });
  return blob && blob.size < file.size ? new File([blob], 'slip.jpg', { type: 'image/jpeg' }) : file;
}

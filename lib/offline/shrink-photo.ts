import { PHOTO_EDGE_PX } from "@/lib/sync/photos";

/**
 * Photos made small on the phone. Drawing a picture and packing it anew leaves everything behind that
 * was not picture: where it was taken, when, with what.
 */
const QUALITY = 0.82;
/** No phone's camera makes more; unpacking it could bring the page down. */
const MOST_BYTES = 40_000_000;

/**
 * A photo as JPEG, its longer edge at most `edgePx`.
 * @throws Error with words for the person when the file is no photo
 */
export async function shrinkPhoto(photo: Blob, edgePx = PHOTO_EDGE_PX): Promise<ArrayBuffer> {
  if (photo.size > MOST_BYTES) throw new Error("This file is too large for a photo.");
  const picture = await createImageBitmap(photo).catch(() => {
    throw new Error("This file is no photo that the phone can read.");
  });
  const scale = Math.min(1, edgePx / Math.max(picture.width, picture.height));
  const canvas = document.createElement("canvas");
  canvas.width = Math.max(1, Math.round(picture.width * scale));
  canvas.height = Math.max(1, Math.round(picture.height * scale));
  const pen = canvas.getContext("2d");
  if (!pen) throw new Error("This phone cannot make the photo smaller.");
  // A see-through picture has no black behind it.
  pen.fillStyle = "#fff";
  pen.fillRect(0, 0, canvas.width, canvas.height);
  pen.drawImage(picture, 0, 0, canvas.width, canvas.height);
  picture.close();
  const packed = await new Promise<Blob | null>((resolve) => {
    canvas.toBlob(resolve, "image/jpeg", QUALITY);
  });
  canvas.width = 0;
  if (!packed) throw new Error("This phone cannot make the photo smaller.");
  return packed.arrayBuffer();
}

/** The same for a picture that is kept already. */
export function shrinkPicture(bytes: ArrayBuffer, edgePx: number): Promise<ArrayBuffer> {
  return shrinkPhoto(new Blob([bytes], { type: "image/jpeg" }), edgePx);
}

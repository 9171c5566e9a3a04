import Image from "next/image";

export interface StripPhoto {
  readonly id: string;
  /** What it shows, for those who cannot see it: "Photo of 1 Dec by Jo Fenn". */
  readonly label: string;
}

/** Photos in a row; each opens whole in a window of its own. */
export function PhotoStrip({ photos }: { photos: readonly StripPhoto[] }) {
  if (photos.length === 0) return null;
  return (
    <ul className="my-1.5 flex flex-wrap gap-2">
      {photos.map((photo) => (
        <li key={photo.id}>
          <a href={`/api/v1/photos/${photo.id}`} target="_blank" rel="noopener">
            <Image
              unoptimized
              src={`/api/v1/photos/${photo.id}`}
              alt={photo.label}
              width={120}
              height={90}
              className="h-22 w-30 border border-rule object-cover"
            />
          </a>
        </li>
      ))}
    </ul>
  );
}

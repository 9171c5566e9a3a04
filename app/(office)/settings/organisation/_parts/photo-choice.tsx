import type { Entries } from "@/components/forms/action-form";
import { Checkbox } from "@/components/ui/inputs";
import { Section } from "@/components/ui/page-head";
import type { OrganisationView } from "@/lib/usecases/read-organisation";

/** Whether photos from phones keep where they were taken. */
export function PhotoChoice({
  organisation,
  entries,
}: {
  organisation: OrganisationView;
  entries: Entries;
}) {
  const { key, ...tick } = entries.tick("keepPhotoPosition", organisation.keepPhotoPosition);
  return (
    <Section title="Photos from the field">
      <div className="px-3 py-4">
        <Checkbox
          key={key}
          {...tick}
          label="Photos keep their position"
          hint="Where the camera wrote it down it is shown with the photo. Off, it never leaves the phone. All else a camera writes into a photo is always taken out."
        />
      </div>
    </Section>
  );
}

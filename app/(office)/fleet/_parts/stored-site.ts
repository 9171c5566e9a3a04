import type { SiteFormView } from "@/lib/usecases/save-site";

type Site = NonNullable<SiteFormView["site"]>;

/** A site as its form shows it: coordinates are written out. */
export type StoredSite = Omit<Site, "latitude" | "longitude"> & {
  readonly latitude: string;
  readonly longitude: string;
};

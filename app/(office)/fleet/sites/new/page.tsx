import type { Metadata } from "next";
import { SiteFormPage } from "../../_parts/site-form-page";

export const metadata: Metadata = { title: "Add a site" };

export default function NewSitePage() {
  return <SiteFormPage code={null} />;
}

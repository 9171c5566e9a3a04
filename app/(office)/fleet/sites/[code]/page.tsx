import type { Metadata } from "next";
import { SiteFormPage } from "../../_parts/site-form-page";

export const metadata: Metadata = { title: "Site" };

export default async function SitePage(props: { params: Promise<{ code: string }> }) {
  return <SiteFormPage code={decodeURIComponent((await props.params).code)} />;
}

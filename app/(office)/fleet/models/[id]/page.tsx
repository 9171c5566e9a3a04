import type { Metadata } from "next";
import { ModelFormPage } from "../../_parts/model-form-page";

export const metadata: Metadata = { title: "Device model" };

export default async function ModelPage(props: { params: Promise<{ id: string }> }) {
  return <ModelFormPage id={(await props.params).id} />;
}

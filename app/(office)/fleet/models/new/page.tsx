import type { Metadata } from "next";
import { ModelFormPage } from "../../_parts/model-form-page";

export const metadata: Metadata = { title: "Add a device model" };

export default function NewModelPage() {
  return <ModelFormPage id={null} />;
}

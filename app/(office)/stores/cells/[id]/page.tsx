import type { Metadata } from "next";
import { CellFormPage } from "../../_parts/cell-form-page";

export const metadata: Metadata = { title: "Cell type" };

export default async function CellTypePage(props: { params: Promise<{ id: string }> }) {
  return <CellFormPage id={(await props.params).id} />;
}

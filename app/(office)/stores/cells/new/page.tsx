import type { Metadata } from "next";
import { CellFormPage } from "../../_parts/cell-form-page";

export const metadata: Metadata = { title: "Add a cell type" };

export default function NewCellTypePage() {
  return <CellFormPage id={null} />;
}

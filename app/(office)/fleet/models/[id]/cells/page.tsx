import type { Metadata } from "next";
import { CellChoicePage } from "../../../_parts/cell-choice-page";

export const metadata: Metadata = { title: "Which cell?" };

export default async function ModelCellsPage(props: { params: Promise<{ id: string }> }) {
  return <CellChoicePage of={{ modelId: (await props.params).id }} />;
}

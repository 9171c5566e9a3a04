import type { Metadata } from "next";
import { CellChoicePage } from "../../_parts/cell-choice-page";

export const metadata: Metadata = { title: "Which cell?" };

export default async function AssetCellsPage(props: { params: Promise<{ tag: string }> }) {
  return <CellChoicePage of={{ tag: decodeURIComponent((await props.params).tag) }} />;
}

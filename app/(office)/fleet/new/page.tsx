import type { Metadata } from "next";
import { AssetFormPage } from "../_parts/asset-form-page";

export const metadata: Metadata = { title: "Add an asset" };

export default function NewAssetPage() {
  return <AssetFormPage tag={null} />;
}

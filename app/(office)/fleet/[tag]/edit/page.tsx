import type { Metadata } from "next";
import { AssetFormPage } from "../../_parts/asset-form-page";

export const metadata: Metadata = { title: "Edit an asset" };

export default async function EditAssetPage(props: { params: Promise<{ tag: string }> }) {
  return <AssetFormPage tag={decodeURIComponent((await props.params).tag)} />;
}

import Link from "next/link";
import { Notice } from "@/components/ui/notice";
import { findingWords } from "@/lib/present/finding-words";
import type { AssetFindings } from "@/lib/usecases/list-findings";
import type { AssetView } from "@/lib/usecases/read-asset";

/** Findings about the fleet that concern this pack. */
export function AssetFindingNotices(props: { view: AssetView; findings: AssetFindings }) {
  const { organisation } = props.view;
  return props.findings.map((finding) => {
    const { title, evidence } = findingWords(finding, organisation.locale);
    return (
      <Notice
        key={finding.id}
        kind="warn"
        word={title}
        action={
          <Link className="textlink" href={`/record/findings#finding-${finding.id}`}>
            What to do
          </Link>
        }
      >
        {evidence}
      </Notice>
    );
  });
}

import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { BigButton } from "@/components/ui/big-button";
import { Button } from "@/components/ui/button";
import { ChipLink } from "@/components/ui/chip-link";
import { DataTable, type Column } from "@/components/ui/data-table";
import { Checkbox, NumberInput, TextInput } from "@/components/ui/inputs";
import { Keypad } from "@/components/ui/keypad";
import { Masthead } from "@/components/ui/masthead";
import { Caution, Notice } from "@/components/ui/notice";
import { Pager } from "@/components/ui/pager";
import { Select } from "@/components/ui/select";
import { Skeleton } from "@/components/ui/states";

/** The ids that an attribute of the first such element refers to, all present on the page. */
function described(html: string): string {
  const ids = /aria-describedby="([^"]+)"/.exec(html)?.[1]?.split(" ") ?? [];
  return ids.map((id) => new RegExp(`id="${id}"[^>]*>([^<]*)`).exec(html)?.[1] ?? "?").join(" | ");
}

describe("fields", () => {
  // WCAG 2.2, SC 3.3.1 and 3.3.2: an entry has a label, and an error is named in text.
  it("tie label, hint and error to the control and keep what was typed", () => {
    const html = renderToStaticMarkup(
      <TextInput name="tag" label="Tag" hint="As on the plate" error="Taken" defaultValue="QF-1" />,
    );
    expect(html).toContain('<label for="field-tag"');
    expect(html).toMatch(/<input[^>]*id="field-tag"/);
    expect(html).toContain('value="QF-1"');
    expect(html).toContain('aria-invalid="true"');
    expect(described(html)).toBe("As on the plate | Taken");
  });
  it("are required unless said to be optional, in words", () => {
    expect(renderToStaticMarkup(<TextInput name="a" label="A" />)).toContain("required");
    const optional = renderToStaticMarkup(<TextInput name="a" label="A" optional />);
    expect(optional).not.toContain("required");
    expect(optional).toContain("(optional)");
  });
  it("keep a number as it was typed, with its unit read out", () => {
    const html = renderToStaticMarkup(
      <NumberInput name="v" label="Cut-off" unit="V" defaultValue="2,1" />,
    );
    expect(html).toContain('value="2,1"');
    expect(html).toContain('inputMode="decimal"');
    expect(described(html)).toBe("V");
  });
  it("choose what was chosen before", () => {
    const options = ["LR6", "LR20"].map((value) => ({ value, label: value }));
    const html = renderToStaticMarkup(
      <Select name="cell" label="Cell type" options={options} defaultValue="LR20" />,
    );
    expect(html).toMatch(/<option value="LR20" selected=""/);
    const box = renderToStaticMarkup(<Checkbox name="boat" label="Boat" defaultChecked />);
    expect(box).toMatch(/<input[^>]*checked=""/);
    expect(box).toContain('<label for="field-boat"');
  });
});

describe("DataTable", () => {
  interface Item {
    tag: string;
    left: string;
  }
  const columns: Column<Item>[] = [
    { key: "tag", head: "Tag", sortKey: "tag", rowHeader: true, cell: (row) => row.tag },
    { key: "left", head: "Left", sortKey: "left", align: "right", cell: (row) => row.left },
    { key: "note", head: "Note", wideOnly: true, cell: () => "–" },
  ];
  const table = (rows: Item[]) =>
    renderToStaticMarkup(
      <DataTable
        caption="Fleet"
        columns={columns}
        rows={rows}
        rowKey={(row) => row.tag}
        selectedKey="QF-2"
        empty="Add an asset"
        sort={{ key: "left", direction: "ascending", hrefFor: (key, to) => `?s=${key}.${to}` }}
      />,
    );
  const rows = [
    { tag: "QF-1", left: "9 %" },
    { tag: "QF-2", left: "out" },
  ];
  it("has a caption, row and column heads, and a region that the keyboard can scroll", () => {
    const html = table(rows);
    expect(html).toMatch(/<caption[^>]*>Fleet<\/caption>/);
    expect(html.match(/<th scope="row"/g)).toHaveLength(2);
    expect(html.match(/<th scope="col"/g)).toHaveLength(3);
    expect(html).toMatch(/role="region" aria-label="Fleet" tabindex="0"/);
    expect(html.match(/<tr aria-current="true"/g)).toHaveLength(1);
  });
  it("sorts by links: the sorted column turns round, another begins upward", () => {
    const html = table(rows);
    expect(html).toMatch(/aria-sort="ascending"[^>]*><a[^>]*href="\?s=left\.descending"/);
    expect(html).toContain('href="?s=tag.ascending"');
    expect(html.match(/aria-sort/g)).toHaveLength(1);
  });
  it("says what to do when there is nothing", () => {
    expect(table([])).toMatch(/<td colSpan="3"[^>]*>Add an asset<\/td>/i);
  });
});

describe("navigation", () => {
  it("marks the current screen and shows only the allowed ones", () => {
    const html = renderToStaticMarkup(
      <Masthead
        current="Fleet"
        today="Tue 1 Dec 2026"
        person={{ name: "Ada", role: "Supervisor" }}
        allowed={["Horizon", "Fleet"]}
      >
        <button>Sign out</button>
      </Masthead>,
    );
    expect(html).toMatch(
      /aria-current="page"[^>]*href="\/fleet"|href="\/fleet"[^>]*aria-current="page"/,
    );
    expect(html).not.toContain("Settings");
    expect(html).toMatch(/popoverTarget="person-menu"/i);
    expect(html).toMatch(/id="person-menu" popover="auto"/);
    expect(html).toContain('href="#main"');
  });
  it("pages by addresses, and marks where one stands", () => {
    const html = renderToStaticMarkup(
      <Pager page={1} pageCount={3} summary="1–100 of 250" hrefFor={(page) => `?page=${page}`} />,
    );
    expect(html).toMatch(/aria-current="page"[^>]*>1</);
    expect(html).not.toMatch(/<a[^>]*>Previous/);
    expect(html).toMatch(/<a[^>]*href="\?page=2"[^>]*>Next/);
  });
  it("says by more than colour that a filter is on", () => {
    const on = renderToStaticMarkup(
      <ChipLink href="/fleet" active>
        Out
      </ChipLink>,
    );
    expect(on).toContain('aria-current="true"');
    expect(on).toContain("×");
  });
});

describe("acts and words", () => {
  it("makes a busy button inert and says so", () => {
    const html = renderToStaticMarkup(<Button busy="Saving…">Save</Button>);
    expect(html).toContain('disabled=""');
    expect(html).toContain("Saving…");
    expect(html).toContain('type="button"');
  });
  it("keeps phone targets large: 56 px, keys 60 px (Tailwind: min-h-n is n × 4 px)", () => {
    expect(renderToStaticMarkup(<BigButton>Swap</BigButton>)).toContain("min-h-14");
    const keys = renderToStaticMarkup(
      <Keypad value="" onChange={() => undefined} decimalSign="," label="Volts" />,
    );
    expect(keys.match(/<button[^>]*min-h-15/g)).toHaveLength(12);
    expect(keys).toContain('aria-label="Erase the last digit"');
    expect(keys).toContain('aria-label="Decimal sign"');
  });
  it("yields in every caution to those who know the place", () => {
    const html = renderToStaticMarkup(<Caution title="Lithium cell">Do not short.</Caution>);
    expect(html).toContain('aria-label="Caution: Lithium cell"');
    expect(html).toMatch(/site rules, the maker&#x27;s data and licensed practice/);
  });
  it("interrupts for trouble only, and tells kinds apart by a word", () => {
    expect(renderToStaticMarkup(<Notice kind="trouble">No mail.</Notice>)).toContain(
      'role="alert"',
    );
    const warn = renderToStaticMarkup(<Notice kind="warn">Old readings.</Notice>);
    expect(warn).toContain('role="status"');
    expect(warn).toContain("Mind.");
    expect(renderToStaticMarkup(<Skeleton label="Loading the fleet" />)).toMatch(
      /role="status".*Loading the fleet…/,
    );
  });
});

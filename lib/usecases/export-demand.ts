import { formatFor, writeTable } from "@/lib/csv/write-table";
import { readDemand } from "./read-demand";
import { defineUseCase } from "./use-case";

const HEAD = [
  ...["designation", "packs in", "to hand", "order below", "order below from forecasts"],
  ...["may run short", "lead time days", "order by", "order now", "order size"],
];

/** Demand by month and the order proposal as CSV: expected cells with their 80 % range. */
export const exportDemand = defineUseCase({
  name: "export-demand",
  allow: readDemand.definition.allow,
  input: readDemand.definition.input,
  async run(deps, actor, input) {
    const { organisation, months, rows } = await readDemand(deps, actor, input);
    const whole = (value: number) => ({ value: Math.round(value), digits: 0 });
    const figures = months.flatMap((month) => {
      const name = month.slice(0, 7);
      return [name, `${name} low`, `${name} high`];
    });
    const lines = rows.map(({ type, packs, order, byMonth }) => [
      ...[type.designation, whole(packs), whole(type.inStock), whole(type.reorderPoint)],
      ...[whole(order.reorderPoint), order.shortFrom, whole(type.leadTimeDays), order.orderBy],
      ...[whole(order.orderNow), whole(order.orderSize)],
      ...byMonth.flatMap(({ mean, p10, p90 }) => [whole(mean), whole(p10), whole(p90)]),
    ]);
    return writeTable([...HEAD, ...figures], lines, formatFor(organisation.locale));
  },
});

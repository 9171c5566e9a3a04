/** The calendar library's row of days, which its own month is made of; it ships no types for it. */
declare module "react-big-calendar/lib/DateContentRow" {
  import type { ComponentType, ReactNode } from "react";

  interface DateContentRowProps {
    className?: string;
    range: Date[];
    events: object[];
    resourceId?: string;
    minRows: number;
    maxRows: number;
    resizable?: boolean;
    selected?: object;
    renderHeader?: (head: { date: Date; key: string; className: string }) => ReactNode;
    getNow: () => Date;
    onSelect: (...given: never[]) => void;
    localizer: object;
    accessors: object;
    getters: object;
    components: object;
  }
  const DateContentRow: ComponentType<DateContentRowProps>;
  export { DateContentRow as default };
}

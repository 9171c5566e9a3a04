import type { CrewsView } from "@/lib/usecases/list-crews";

export interface CrewsPageProps {
  view: CrewsView;
  mayChange: boolean;
  /** The id a new thing will get: sending its form twice makes one. */
  newId: string;
}

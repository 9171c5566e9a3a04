import type { World } from "../world";
import type { ScenarioAsset } from "./assets";
import type { CatalogueCell } from "./catalogue-cell";
import type { ScenarioModel } from "./device-model";
import type { District } from "./district";
import type {
  ScenarioDeviceEvent,
  ScenarioDraw,
  ScenarioPack,
  ScenarioReading,
  ScenarioRound,
} from "./field-log";
import type { ScenarioSite } from "./sites";
import type { ScenarioAbsence, ScenarioCrew, ScenarioPerson, ScenarioTechnician } from "./staff";
import type { ScenarioLot, ScenarioStockMove } from "./store-room";

/** The Quillmere Drainage Board at a moment, with the three years behind it. Wholly invented. */
export interface Scenario {
  readonly organisation: {
    readonly name: string;
    readonly timeZone: string;
    readonly currency: string;
    readonly locale: string;
  };
  readonly now: Date;
  /** Local calendar day of `now`, and of the beginning, as epoch days. */
  readonly today: number;
  readonly firstDay: number;
  readonly district: District;
  readonly people: readonly ScenarioPerson[];
  readonly crews: readonly ScenarioCrew[];
  readonly technicians: readonly ScenarioTechnician[];
  readonly absences: readonly ScenarioAbsence[];
  readonly cellTypes: readonly CatalogueCell[];
  readonly models: readonly ScenarioModel[];
  readonly monthlyMeanDc: readonly number[];
  readonly sites: readonly ScenarioSite[];
  readonly assets: readonly ScenarioAsset[];
  readonly lots: readonly ScenarioLot[];
  readonly stockMoves: readonly ScenarioStockMove[];
  readonly stockCounts: readonly {
    readonly lotCode: string;
    readonly place: string;
    readonly cells: number;
  }[];
  readonly packs: readonly ScenarioPack[];
  readonly readings: readonly ScenarioReading[];
  readonly events: readonly ScenarioDeviceEvent[];
  readonly rounds: readonly ScenarioRound[];
  readonly draws: readonly ScenarioDraw[];
  readonly lastHeard: ReadonlyMap<string, Date>;
  readonly firmwareVersion: ReadonlyMap<string, string>;
  /** The hidden truth behind it all: for judging forecasts, never for making them. */
  readonly world: World;
}

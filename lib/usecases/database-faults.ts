import { AppError, conflict, type Fault } from "@/lib/errors";

/** What PostgreSQL says about a broken rule (SQLSTATE and the constraint's name). */
interface DatabaseFault {
  readonly code: string;
  readonly constraint?: string;
  readonly table?: string;
}

/** Unique and exclusion constraints in the words of the person who ran into them. */
const WORDS: Readonly<Record<string, { field: string; message: string }>> = {
  one_pack_at_a_time: {
    field: "at",
    message:
      "Another pack was in this asset at that time. Two packs of one asset cannot overlap: check the dates.",
  },
  one_installed_pack: {
    field: "at",
    message: "This asset holds a pack already: record a swap instead of an install.",
  },
  site_code_key: { field: "code", message: "Another site has this code." },
  asset_tag_key: { field: "tag", message: "Another asset has this tag." },
  device_model_name_key: { field: "name", message: "Another device model has this name." },
  cell_type_designation_key: {
    field: "designation",
    message: "Another cell type has this designation.",
  },
  lot_code_key: { field: "code", message: "Another lot has this code." },
  stock_place_name_key: { field: "name", message: "Another place has this name." },
  climate_name_key: { field: "name", message: "Another climate has this name." },
  person_email_key: { field: "email", message: "Somebody with this mail address has an account." },
  depot_name_key: { field: "name", message: "Another depot has this name." },
  crew_name_key: { field: "name", message: "Another crew has this name." },
  van_name_key: { field: "name", message: "Another van has this name." },
  technician_person_id_key: { field: "personId", message: "This person is a technician already." },
  technician_van_id_key: { field: "vanId", message: "Another technician drives this van." },
  absence_technician_id_daterange_excl: {
    field: "firstDay",
    message: "Another absence of this technician covers some of these days.",
  },
};

/**
 * Runs a write; a rule of the database that it breaks becomes an expected error with the
 * field at fault. Everything else is thrown on.
 */
export async function mapDatabaseFault<T>(work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    throw (isDatabaseFault(error) && inWords(error)) || error;
  }
}

function inWords(error: DatabaseFault): AppError | null {
  const known = WORDS[error.constraint ?? ""];
  if (known) {
    const fault: Fault = known;
    return new AppError("conflict", known.message, [fault]);
  }
  // 40001 serialization_failure, 40P01 deadlock_detected: nothing was written.
  if (error.code === "40001" || error.code === "40P01") {
    return conflict("Somebody else changed this at the same moment. Please try again.");
  }
  return null;
}

function isDatabaseFault(error: unknown): error is DatabaseFault {
  return error instanceof Error && "code" in error && typeof error.code === "string";
}

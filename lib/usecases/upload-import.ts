import { z } from "zod";
import { insertImportRun } from "@/db/queries/import-runs";
import { decodeText } from "@/lib/csv/decode-text";
import { guessFormat } from "@/lib/csv/guess-format";
import { IMPORT_FIELDS, IMPORT_KINDS } from "@/lib/csv/import-kinds";
import { guessColumns } from "@/lib/csv/match-columns";
import { readTable } from "@/lib/csv/read-table";
import { invalid } from "@/lib/errors";
import { defineUseCase, personIdOf } from "./use-case";

export const LARGEST_FILE_BYTES = 9_000_000;

/** Takes a file in and guesses how it is written and which column is which. */
export const uploadImport = defineUseCase({
  name: "upload-import",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    id: z.uuid(),
    kind: z.enum(IMPORT_KINDS, "Choose what the file holds."),
    fileName: z.string().trim().min(1, "Choose a file.").max(200),
    bytes: z
      .instanceof(Uint8Array)
      .refine((b) => b.length > 0, "The file is empty.")
      .refine(
        (b) => b.length <= LARGEST_FILE_BYTES,
        "The file is larger than 9 MB: send it in parts.",
      ),
  }),
  run: async (deps, actor, given): Promise<{ readonly id: string }> => {
    const { text, trouble } = decodeText(given.bytes);
    if (text === null) throw invalid(trouble, [{ field: "file", message: trouble }]);
    const format = guessFormat(text);
    const { head, trouble: broken } = readTable(text, format.delimiter);
    if (broken || !head[0]) {
      const message = broken
        ? `Row ${broken.row}: ${broken.message}`
        : "The first row must name the columns.";
      throw invalid(message, [{ field: "file", message }]);
    }
    const settings = {
      ...format,
      columns: guessColumns(head, IMPORT_FIELDS[given.kind]),
      closePrevious: given.kind === "installs",
    };
    const { id, kind, fileName } = given;
    const createdBy = personIdOf(actor) ?? "";
    await deps.db.transaction().execute((trx) =>
      insertImportRun(trx, {
        ...{ id, kind, fileName, settings, createdBy },
        ...{ content: text, createdAt: deps.now() },
      }),
    );
    return { id };
  },
});

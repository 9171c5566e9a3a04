import { basename } from "node:path";

const KEBAB = /^\.?[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9-]+)*$/;
const MIGRATION = /^\d{8}_\d{2}_[a-z0-9_]+\.ts$/;
const EMPTY_WORDS = /^(utils?|helpers?|common|misc|types)\.[a-z]+$/;
const CURATED = /\/lib\/[a-z]+\/index\.ts$/;

/** File names say what is inside: kebab-case, no drawers for odds and ends, no barrels. */
const fileName = {
  meta: {
    type: "problem",
    messages: {
      kebab: "File names are kebab-case: {{name}}.",
      empty: "Name the file by what it does: {{name}} says nothing.",
      barrel: "No barrels but one curated index per core in lib/: import from the file itself.",
    },
    schema: [],
  },
  /** @param {import("eslint").Rule.RuleContext} context */
  create(context) {
    const path = context.filename.replaceAll("\\", "/");
    const name = basename(path);
    const judge = () => {
      if (EMPTY_WORDS.test(name)) return "empty";
      if (name.startsWith("index.") && !CURATED.test(path)) return "barrel";
      return KEBAB.test(name) || MIGRATION.test(name) ? undefined : "kebab";
    };
    return {
      Program(/** @type {import("eslint").AST.Program} */ node) {
        const messageId = judge();
        if (messageId) context.report({ node, messageId, data: { name } });
      },
    };
  },
};

/** The rules of this house that no published plugin has. */
export const house = { rules: { "file-name": fileName } };

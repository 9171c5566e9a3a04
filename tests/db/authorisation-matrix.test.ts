import { readdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { isAppError } from "@/lib/errors";
import type { Actor, Deps, Role, UseCase } from "@/lib/usecases/use-case";
import { actorWith, systemActor } from "@/tests/support/deps";
import { MATRIX } from "./authorisation-matrix";

const FOLDER = fileURLToPath(new URL("../../lib/usecases/", import.meta.url));

const role = (name: Role): Actor => actorWith([name]);
const key = (...scopes: string[]): Actor => ({ kind: "api-key", apiKeyId: "key", scopes });
const ACTORS: Readonly<Record<string, { readonly called: string; readonly actor: Actor }>> = {
  A: { called: "an administrator", actor: role("administrator") },
  D: { called: "a dispatcher", actor: role("dispatcher") },
  S: { called: "a supervisor", actor: role("supervisor") },
  T: { called: "a technician", actor: role("technician") },
  W: { called: "the worker", actor: systemActor },
  V: { called: "a visitor", actor: { kind: "visitor", origin: "192.0.2.1" } },
  r: { called: "a key with register:read", actor: key("register:read") },
  w: { called: "a key with readings:write", actor: key("readings:write") },
};

type AnyUseCase = UseCase<never, unknown>;
const useCases = await allUseCases();

async function allUseCases(): Promise<Map<string, AnyUseCase>> {
  const found = new Map<string, AnyUseCase>();
  for (const file of readdirSync(FOLDER).filter((name) => name.endsWith(".ts"))) {
    const module: Record<string, unknown> = await import(`../../lib/usecases/${file}`);
    for (const value of Object.values(module)) {
      if (!isUseCase(value)) continue;
      const { name } = value.definition;
      const other = found.get(name);
      if (other && other !== value) throw new Error(`two use cases are called "${name}"`);
      found.set(name, value);
    }
  }
  return found;
}

function isUseCase(value: unknown): value is AnyUseCase {
  return typeof value === "function" && "definition" in value;
}

/** Dependencies that must not be touched: what is refused is refused before any work. */
function untouchable(): { deps: Deps; touched: string[] } {
  const touched: string[] = [];
  const deps = new Proxy({} as Deps, {
    get(_, property) {
      touched.push(String(property));
      throw new Error("work began");
    },
  });
  return { deps, touched };
}

/** Tries the door with input that no schema takes, so that whoever is let in gets no further. */
async function attempt(act: AnyUseCase, actor: Actor) {
  const { deps, touched } = untouchable();
  try {
    await act(deps, actor, Symbol("no input") as never);
  } catch (error) {
    const refused = isAppError(error) && ["forbidden", "not_signed_in"].includes(error.code);
    return { refused, code: isAppError(error) ? error.code : "work began", touched };
  }
  return { refused: false, code: "done", touched };
}

describe("the matrix of use cases and who may call them", () => {
  it("knows every use case, and none that is gone", () => {
    const missing = [...useCases.keys()].filter((name) => !(name in MATRIX));
    const gone = Object.keys(MATRIX).filter((name) => !useCases.has(name));
    expect(
      missing.map((name) => `add a line for "${name}" to tests/db/authorisation-matrix.ts`),
    ).toEqual([]);
    expect(gone.map((name) => `take out "${name}": no use case has this name`)).toEqual([]);
  });

  it("uses letters that stand for somebody", () => {
    const letters = new Set(Object.values(MATRIX).join("").replaceAll(" ", ""));
    expect([...letters].filter((letter) => !(letter in ACTORS))).toEqual([]);
  });
});

describe.each([...useCases].filter(([name]) => name in MATRIX))("%s", (name, useCase) => {
  for (const [letter, { called, actor }] of Object.entries(ACTORS)) {
    const welcome = MATRIX[name]?.includes(letter) ?? false;
    it(`${welcome ? "lets in" : "refuses"} ${called}`, async () => {
      const { refused, code, touched } = await attempt(useCase, actor);
      expect(refused).toBe(!welcome);
      if (welcome) return;
      expect(code).toBe(actor.kind === "visitor" ? "not_signed_in" : "forbidden");
      expect(touched).toEqual([]);
    });
  }
});

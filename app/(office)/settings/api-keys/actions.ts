"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { API_SCOPES, createApiKey } from "@/lib/usecases/create-api-key";
import { revokeApiKey } from "@/lib/usecases/revoke-api-key";
import { text, ticked } from "../_parts/read-form";

const renew = () => revalidatePath("/settings/api-keys");

export const createApiKeyAction = defineAction(
  createApiKey,
  (form) => ({ name: text(form, "name"), scopes: ticked(form, "scope", API_SCOPES) }),
  renew,
);

export const revokeApiKeyAction = defineAction(
  revokeApiKey,
  (form) => ({ apiKeyId: text(form, "id") }),
  renew,
);

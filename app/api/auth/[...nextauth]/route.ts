import { handlers } from "@/lib/server/auth";

export const { GET, POST } = handlers;

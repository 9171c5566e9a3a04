import { redirect } from "next/navigation";
import { firstPageOf } from "@/lib/server/first-page";
import { requireActor } from "@/lib/server/session";

export default async function Home() {
  redirect(firstPageOf(await requireActor()));
}

export { heldBy, withDependents } from "@/lib/sync/outbox";

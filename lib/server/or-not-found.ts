import { notFound } from "next/navigation";
import { isAppError } from "@/lib/errors";

/** Shows the not-found page when a read use case finds nothing. */
export async function orNotFound<T>(read: () => Promise<T>): Promise<T> {
  try {
    return await read();
  } catch (error) {
    if (isAppError(error) && error.code === "not_found") notFound();
    throw error;
  }
}

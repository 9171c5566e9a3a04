/** What the API said was wrong. */
export class ApiError extends Error {
  constructor(
    message: string,
    readonly code: string,
    readonly faults: readonly { readonly field: string; readonly message: string }[] = [],
  ) {
    super(message);
  }
}

interface ErrorBody {
  error?: {
    code?: string;
    message?: string;
    faults?: { field: string; message: string }[];
  };
}

/**
 * Asks our own API. @throws ApiError with the words to show; "offline" when there is no answer
 */
export async function fetchJson<Result>(
  address: string,
  init: { method?: "GET" | "POST" | "DELETE"; body?: unknown } = {},
): Promise<Result> {
  const { method = "GET", body } = init;
  let response: Response;
  try {
    response = await fetch(address, {
      method,
      ...(body !== undefined && {
        body: JSON.stringify(body),
        headers: { "content-type": "application/json" },
      }),
    });
  } catch {
    throw new ApiError("No connection. Nothing was changed; please try again.", "offline");
  }
  const answer = (await response.json().catch(() => ({}))) as Result & ErrorBody;
  if (response.ok) return answer;
  const { code = "unavailable", message = "Something went wrong.", faults } = answer.error ?? {};
  throw new ApiError(faults?.[0]?.message ?? message, code, faults);
}

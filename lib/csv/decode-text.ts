export type Decoded =
  | { readonly text: string; readonly trouble: null }
  | { readonly text: null; readonly trouble: string };

/** UTF-8 with or without a byte-order mark; anything else is refused, with what to do. */
export function decodeText(bytes: Uint8Array): Decoded {
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff)) {
    return trouble("This file is in UTF-16. Save it as CSV UTF-8 and send it again.");
  }
  if (bytes.includes(0)) return trouble("This is no text file. Save the sheet as CSV UTF-8.");
  try {
    return { text: new TextDecoder("utf-8", { fatal: true }).decode(bytes), trouble: null };
  } catch {
    return trouble("This file is not in UTF-8. Save it as CSV UTF-8 and send it again.");
  }
}

function trouble(message: string): Decoded {
  return { text: null, trouble: message };
}

import { TextInput } from "@/components/ui/inputs";

/** The field for a new password, alike wherever one is chosen. */
export function NewPassword({ error, label }: { error: string | undefined; label?: string }) {
  return (
    <TextInput
      name="password"
      label={label ?? "New password"}
      hint="At least 12 characters. Several words in a row are easy to keep and hard to guess."
      type="password"
      autoComplete="new-password"
      minLength={12}
      maxLength={200}
      error={error}
    />
  );
}

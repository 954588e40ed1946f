/** What went wrong, in one line for logs and records. */
export const errorText = (error: unknown): string => (error instanceof Error ? error.message : String(error));

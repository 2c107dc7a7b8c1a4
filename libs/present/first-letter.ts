/** @returns the text with its first letter large */
export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** @returns the text with its first letter small, to stand behind a colon */
export function lowered(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}

import { jsonFrom, readModerate } from './input-file.js';

/**
 * Reads a site file of any of its forms: JSON, or rows of path, kind and value as text or workbook.
 * @param path what was typed
 * @returns the document, not yet checked
 * @throws InputProblem where it can't be read
 */
export async function readSiteDocument(path: string): Promise<unknown> {
  const bytes = await readModerate(path);
  // what reads rows is loaded only where something else than JSON is given
  if (bytes[0] === 0x7b) return jsonFrom(bytes);
  const { isDocumentRows, readDocumentRows } = await import('#libs/meter-files/site-document.js');
  return isDocumentRows(bytes) ? readDocumentRows(bytes) : jsonFrom(bytes);
}

/**
 * The beginning of an XML file as text to recognise it by, letters beyond ASCII as they come.
 * @param head the first bytes
 * @returns empty where the file is no XML
 */
export function xmlStart(head: Uint8Array): string {
  const text = new TextDecoder('latin1').decode(head).trimStart();
  return /^<(?:\?xml\s|!--|!DOCTYPE\s|[A-Za-z_])/i.test(text) ? text : '';
}

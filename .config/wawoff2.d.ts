declare module 'wawoff2' {
  const wawoff2: { compress(ttf: Uint8Array): Promise<Uint8Array> };
  export default wawoff2;
}

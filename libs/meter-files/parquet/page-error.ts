/** Thrown where a page is not what its header says; the column's reader names column and row. */
export class PageError extends Error {}

/** What the wiring provides under a name, because an interface leaves no trace at run time. */
export const JOBS = Symbol('jobs');
export const SETTINGS = Symbol('settings');
export const CONFIRM = Symbol('confirm');

/** Set by proxy.ts and read where a page sends to the door: a server component is not told its own address. */
export const pathHeader = 'x-evenfall-path';

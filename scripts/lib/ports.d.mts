/** Any free port, for what nobody needs to find by number. */
export function anyPort(): Promise<number>

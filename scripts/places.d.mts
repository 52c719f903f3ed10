export const root: string;
export function localFolder(...names: string[]): string;

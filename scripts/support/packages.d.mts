export function findProgram(name: string): string | null;

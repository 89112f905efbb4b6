export interface ProcessIdentity {
  readonly pid: number;
  readonly ticks: string;
}
export function identify(pid: number): ProcessIdentity | null;
export function stopProcess(
  identity: ProcessIdentity,
  options?: { graceMs?: number; wholeGroup?: boolean },
): Promise<void>;

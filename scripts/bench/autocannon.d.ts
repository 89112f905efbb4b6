/** What the bench uses of autocannon, which brings no types. */
declare module 'autocannon' {
  import type { EventEmitter } from 'node:events';

  interface Options {
    readonly url: string;
    readonly connections: number;
    /** Seconds. */
    readonly duration: number;
    readonly headers?: Readonly<Record<string, string>>;
  }
  interface Result {
    readonly errors: number;
    readonly non2xx: number;
    readonly requests: { readonly average: number };
  }
  /** Emits 'response' with (client, status, bytes, milliseconds). */
  export default function autocannon(
    options: Options,
    done: (error: Error | null, result: Result) => void,
  ): EventEmitter;
}

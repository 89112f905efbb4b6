import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { xoroshiro128plus, xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';

/** The four 32-bit words of a xoroshiro128+ generator, as integers: all there is to save and restore of a stream. */
export type RandomState = readonly [number, number, number, number];

/** A source of uniform random numbers whose state can be saved. */
export interface RandomStream {
  /** The next number, uniform on [0, 1), a multiple of 2⁻⁵³. */
  uniform(): number;
  /** State after the numbers drawn so far; {@link restoreStream} continues from it bit for bit. */
  state(): RandomState;
}

function asState(words: readonly number[]): RandomState {
  const [a, b, c, d] = words;
  if (
    words.length !== 4 ||
    ![a, b, c, d].every((word) => Number.isInteger(word) && word === (word as number) >> 0)
  ) {
    throw new RangeError('A random state is four 32-bit integers.');
  }
  return [a, b, c, d] as RandomState;
}

/**
 * Continues a stream from a saved state.
 *
 * @throws RangeError when the state is not four 32-bit integers, or all are zero.
 */
export function restoreStream(state: RandomState): RandomStream {
  if (asState(state).every((word) => word === 0))
    throw new RangeError('A random state of zeros never moves.');
  const generator = xoroshiro128plusFromState([...state]);
  return {
    uniform: () => uniformFloat64(generator),
    state: () => asState(generator.getState()),
  };
}

/**
 * The state `times` jumps of 2⁶⁴ numbers further: the start of another stream of the same family.
 *
 * @param state a stream's start. @param times a whole number ≥ 0.
 */
export function jumpedState(state: RandomState, times: number): RandomState {
  if (!Number.isSafeInteger(times) || times < 0) throw new RangeError(`${times} is not a number of jumps.`);
  const generator = xoroshiro128plusFromState([...asState(state)]);
  for (let i = 0; i < times; i++) generator.jump();
  return asState(generator.getState());
}

/**
 * Start of stream 0, 1, 2, … of a seed. Stream i lies i + 1 jumps of 2⁶⁴ numbers behind the seeded state, so streams never
 * overlap; the first jump mixes the seed, whose plain state repeats its bits in the first number drawn.
 *
 * @param seed a 32-bit integer. @param index a whole number ≥ 0; each costs a jump, so a caller that walks through many
 * streams goes on with {@link jumpedState}.
 * @throws RangeError for a seed or index outside its range.
 * Source: pure-rand's xoroshiro128+ (Blackman & Vigna 2018) and its jump.
 */
export function streamState(seed: number, index: number): RandomState {
  if (!Number.isInteger(seed) || seed !== seed >> 0)
    throw new RangeError(`The seed ${seed} is not a 32-bit integer.`);
  return jumpedState(asState(xoroshiro128plus(seed).getState()), index + 1);
}

/** Opens stream `index` of a seed: see {@link streamState}. */
export function openStream(seed: number, index: number): RandomStream {
  return restoreStream(streamState(seed, index));
}

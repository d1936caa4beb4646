import { move, transferableSymbol, valueSymbol } from 'piscina';

/** A thread's answer whose buffers move to the main thread instead of being copied. */
export function moved<Value>(value: Value, buffers: ArrayBufferLike[]): Value {
  const answer = { [transferableSymbol]: buffers, [valueSymbol]: value };
  return move(answer as never) as unknown as Value;
}

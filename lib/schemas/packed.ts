declare const content: unique symbol;

/**
 * JSON on its way to a page: thousands of values that are written once and read once, not value by
 * value with the rest of the page.
 */
export type Packed<Value> = string & { readonly [content]: Value };

export const pack = <Value>(value: Value) => JSON.stringify(value) as Packed<Value>;

export const unpack = <Value>(packed: Packed<Value>): Value => JSON.parse(packed);

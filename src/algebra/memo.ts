/** The value remembered under a key, made on the first request. */
export function remember<K, V>(memo: Map<K, V>, key: K, make: () => V): V {
  const known = memo.get(key);
  if (known !== undefined) return known;
  const value = make();
  memo.set(key, value);
  return value;
}

/**
 * The same function, which remembers for each object what it made of it last, as long as the object is there: a drawing is made once for a size, however
 * often its figure is rendered. Further arguments are compared one by one.
 */
export function remembered<Key extends object, Rest extends readonly unknown[], Made>(
  make: (key: Key, ...rest: Rest) => Made,
): (key: Key, ...rest: Rest) => Made {
  const last = new WeakMap<Key, { readonly rest: Rest; readonly made: Made }>();
  return (key, ...rest) => {
    const known = last.get(key);
    if (known?.rest.every((value, n) => Object.is(value, rest[n]))) return known.made;
    const made = make(key, ...rest);
    last.set(key, { rest, made });
    return made;
  };
}

import { useState } from 'react';

/**
 * A choice that stands in the page's address, so that a reload, a bookmark and a sent link keep it. The
 * default is left out of the address.
 *
 * @param name of the search parameter
 * @param initial what the server read from the address, so that both draw the same
 */
export function useSearchState<Value extends string>(
  name: string,
  initial: Value,
  defaultValue: Value,
): [Value, (value: Value) => void] {
  const [value, setValue] = useState(initial);
  const choose = (next: Value) => {
    setValue(next);
    const address = new URL(location.href);
    if (next === defaultValue) address.searchParams.delete(name);
    else address.searchParams.set(name, next);
    history.replaceState(history.state, '', address);
  };
  return [value, choose];
}

import { useSyncExternalStore, type FormHTMLAttributes } from 'react';

const never = () => () => undefined;

/** False in the server's HTML and until the island has taken it over, then true. */
function useAwake(): boolean {
  return useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
}

/**
 * A form whose fields belong to an island. Until the island is awake they cannot be typed into, because it would
 * put its own values over what was typed.
 */
export function IslandForm({ children, ...rest }: FormHTMLAttributes<HTMLFormElement>) {
  const awake = useAwake();
  return (
    <form {...rest}>
      <fieldset className="contents" role="presentation" disabled={!awake}>
        {children}
      </fieldset>
    </form>
  );
}

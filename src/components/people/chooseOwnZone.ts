/** Sets a list of time zones to the zone of this browser, unless the list does not have it. */
export function chooseOwnZone(list: HTMLSelectElement): void {
  const own = new Intl.DateTimeFormat().resolvedOptions().timeZone;
  if ([...list.options].some((option) => option.value === own)) list.value = own;
}

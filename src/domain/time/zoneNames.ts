/** Time zones to choose from, in groups by region: "UTC" first, then "Africa", "America", … */
export function zoneNamesByRegion(): { region: string; zones: string[] }[] {
  const regions = new Map<string, string[]>([['Universal', ['UTC']]]);
  for (const zone of Intl.supportedValuesOf('timeZone')) {
    const region = zone.split('/')[0];
    if (!region || region === zone) continue;
    const zones = regions.get(region);
    if (zones) zones.push(zone);
    else regions.set(region, [zone]);
  }
  return [...regions].map(([region, zones]) => ({ region, zones }));
}

/** "Etc/GMT-1" as "UTC+1": the signs of these names are the other way round. Any other name as it is. */
export function zoneLabel(zone: string): string {
  const [, sign, hours] = /^Etc\/GMT([+-])(\d+)$/.exec(zone) ?? [];
  return hours === undefined ? zone : `UTC${sign === '-' ? '+' : '\u2212'}${hours}`;
}

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

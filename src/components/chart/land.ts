import type { FeatureCollection } from 'geojson';
import type { GeometryCollection, Topology } from 'topojson-specification';

let land: FeatureCollection | null = null;

/** Coastlines of the world, fetched when a map is first shown. */
export async function loadLand(): Promise<FeatureCollection> {
  if (land) return land;
  const [{ feature }, { default: topology }] = await Promise.all([
    import('topojson-client'),
    import('world-atlas/land-110m.json'),
  ]);
  const world = topology as unknown as Topology<{ land: GeometryCollection }>;
  land = feature(world, world.objects.land);
  return land;
}

/** What is there already, for a first drawing without waiting. */
export function loadedLand(): FeatureCollection | null {
  return land;
}

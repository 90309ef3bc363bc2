/** The links between routers as arrays: what searches and routers walk. */
import type { LinkId } from './fabric';

export interface FabricLink {
  id: LinkId;
  /** Tile indices. */
  from: number;
  to: number;
  channels: number;
}

/** What a search over routers needs of a fabric. */
export interface LinkGraph {
  tileCount: number;
  links: readonly FabricLink[];
  /** Link indices by the tile they leave or enter. */
  outLinks: readonly (readonly number[])[];
  inLinks: readonly (readonly number[])[];
}

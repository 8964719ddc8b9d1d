/**
 * What goes into the mesher and what comes out. The mesher knows points, sides and regions of the (r, z)
 * half plane; it knows nothing of cases, materials or heat.
 */

/** A place in the half plane: r, z [m]. */
export type Point = readonly [r: number, z: number];

/** One side of a loop: a straight line, or the circular arc that passes through `through`. */
export interface OutlineSide {
  readonly from: Point;
  readonly to: Point;
  readonly through?: Point;
}

/** One region: its outer loop first, then its enclosed voids. Either direction of travel is taken. */
export interface OutlineRegion {
  readonly loops: readonly (readonly OutlineSide[])[];
}

/**
 * Rows of elements laid parallel to one side, for the thin layer in which a film first acts.
 * `side` counts the sides of all regions in order: region, loop, side.
 *
 * Rows are added while they are thinner than the triangles beside them. Where sides with rows meet, the finer of
 * their schedules holds for both. Rows that would take more than two thirds of the nodes are all made thicker.
 */
export interface SideRows {
  readonly side: number;
  /** thickness of the first row [m] */
  readonly thickness: number;
  /** ratio of the thicknesses of neighbouring rows, above 1 */
  readonly growth: number;
}

export interface MeshRequest {
  readonly regions: readonly OutlineRegion[];
  /** number of nodes aimed at (linear triangles: corner nodes) */
  readonly nodes: number;
  /** places that must become nodes, for example probes; inside a region or on a side */
  readonly points?: readonly Point[];
  readonly rows?: readonly SideRows[];
}

/**
 * A conforming mesh of linear triangles. Side edges are the mesh edges that lie on the outline, interfaces
 * between regions included; an arc is followed by chords whose ends lie on the true arc.
 */
export interface TriangleMesh {
  /** r, z pairs [m], 2 per node */
  readonly nodes: Float64Array;
  /** node numbers, 3 per triangle, counter-clockwise in the (r, z) plane with r to the right and z upwards */
  readonly triangles: Uint32Array;
  /** region number, 1 per triangle */
  readonly triangleRegion: Uint16Array;
  /** node numbers, 2 per side edge; the triangle on the left of the way from first to second always exists */
  readonly edges: Uint32Array;
  /**
   * 2 per side edge: the number of the outline side of the region on the left, and of the region on the right
   * or -1 where nothing of the part lies there (an exposed edge, or one on the axis).
   */
  readonly edgeSides: Int32Array;
  /** 1 per side edge: number of its arc, or -1 on a straight side */
  readonly edgeArc: Int32Array;
  /** 3 per arc: centre r, centre z, radius [m] */
  readonly arcs: Float64Array;
  /** node number of each requested point */
  readonly pointNodes: Uint32Array;
}

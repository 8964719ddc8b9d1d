/**
 * What a host keeps between runs while its inputs stand: meshes, assembled matrices, and through the march's workspace
 * factors and bases. Each product is recognised by a key that holds all its inputs and nothing else: surroundings and
 * start temperatures are in none of them, so moving those meshes, assembles, factorizes and solves nothing.
 */
import { refineMesh } from "../../mesh/refineMesh.ts";
import type { TriangleMesh } from "../../mesh/types.ts";
import { createWorkspace } from "../march/workspace.ts";
import type { MarchWorkspace } from "../march/workspace.ts";
import type { PartMatrices } from "./partSystem.ts";
import type { StageMatrices } from "./stageSystem.ts";

/** The newest few products of one kind, by key; the oldest goes first. */
class Shelf<T> {
  readonly #kept = new Map<string, T>();

  constructor(readonly room: number) {}

  get(key: string, make: () => T): T {
    const known = this.#kept.get(key);
    if (known !== undefined) {
      this.#kept.delete(key);
      this.#kept.set(key, known);
      return known;
    }
    const made = make();
    this.#kept.set(key, made);
    if (this.#kept.size > this.room) this.#kept.delete(this.#kept.keys().next().value!);
    return made;
  }

  clear(): void {
    this.#kept.clear();
  }
}

/** A hand at rest needs one outline; an undo or a look at the variant before needs a second. */
const MESHES_KEPT = 2;
/** Of one mesh: materials now and before. Of one part: each stage of a treatment. */
const PARTS_KEPT = 2;
const STAGES_KEPT = 8;

export class KeptWork {
  readonly workspace: MarchWorkspace = createWorkspace();
  /** how often something was made anew; tests of reuse read it */
  readonly counts = { meshes: 0, assemblies: 0, stages: 0 };
  readonly #meshes = new Shelf<TriangleMesh>(MESHES_KEPT);
  #refined = new WeakMap<TriangleMesh, TriangleMesh>();
  #parts = new WeakMap<TriangleMesh, Shelf<PartMatrices>>();
  #stages = new WeakMap<PartMatrices, Shelf<StageMatrices>>();

  mesh(key: string, make: () => TriangleMesh): TriangleMesh {
    return this.#meshes.get(key, () => {
      this.counts.meshes++;
      return make();
    });
  }

  /** Four triangles from each. */
  refined(mesh: TriangleMesh): TriangleMesh {
    let finer = this.#refined.get(mesh);
    if (!finer) {
      this.counts.meshes++;
      finer = refineMesh(mesh);
      this.#refined.set(mesh, finer);
    }
    return finer;
  }

  part(mesh: TriangleMesh, key: string, make: () => PartMatrices): PartMatrices {
    return shelfOf(this.#parts, mesh, PARTS_KEPT).get(key, () => {
      this.counts.assemblies++;
      return make();
    });
  }

  stage(part: PartMatrices, key: string, make: () => StageMatrices): StageMatrices {
    return shelfOf(this.#stages, part, STAGES_KEPT).get(key, () => {
      this.counts.stages++;
      return make();
    });
  }

  /** Gives all memory back; it may be used again. */
  release(): void {
    this.workspace.release();
    this.#meshes.clear();
    this.#refined = new WeakMap();
    this.#parts = new WeakMap();
    this.#stages = new WeakMap();
  }
}

function shelfOf<K extends object, T>(shelves: WeakMap<K, Shelf<T>>, owner: K, room: number): Shelf<T> {
  let shelf = shelves.get(owner);
  if (!shelf) {
    shelf = new Shelf(room);
    shelves.set(owner, shelf);
  }
  return shelf;
}

/**
 * Field snapshots as VTK XML: one unstructured grid (.vtu) per instant and a collection (.pvd) that names them with
 * their times. Points are (r, z, 0) in metres; cells are the drawn linear triangles; point data "temperature" in degC,
 * cell data "region". Data arrays are inline base64 with a 64-bit byte count, little endian. Written after the published
 * description of the VTK XML file formats (Kitware, "VTK File Formats").
 */
import type { CaseResult } from "../run/result.ts";
import { base64 } from "./base64.ts";

const TRIANGLE = 5; // VTK_TRIANGLE

/** One snapshot. @param frame number of the frame in `result.frames` */
export function vtuSnapshot(result: CaseResult, frame: number): string {
  const { nodes, triangles, triangleRegion } = result.section;
  const count = nodes.length / 2;
  const points = new Float64Array(3 * count);
  for (let i = 0; i < count; i++) points.set([nodes[2 * i]!, nodes[2 * i + 1]!], 3 * i);
  const cells = triangleRegion.length;
  const offsets = Int32Array.from({ length: cells }, (_, i) => 3 * (i + 1));
  const temperature = result.frames.temperatures[frame]!;
  return [
    `<?xml version="1.0"?>`,
    `<VTKFile type="UnstructuredGrid" version="1.0" byte_order="LittleEndian" header_type="UInt64">`,
    `<UnstructuredGrid>`,
    `<FieldData>${dataArray("TimeValue", "Float64", Float64Array.of(result.frames.times[frame]!), `NumberOfTuples="1"`)}</FieldData>`,
    `<Piece NumberOfPoints="${count}" NumberOfCells="${cells}">`,
    `<PointData Scalars="temperature">${dataArray("temperature", "Float32", temperature)}</PointData>`,
    `<CellData Scalars="region">${dataArray("region", "UInt16", triangleRegion)}</CellData>`,
    `<Points>${dataArray("Points", "Float64", points, `NumberOfComponents="3"`)}</Points>`,
    `<Cells>`,
    dataArray("connectivity", "Int32", Int32Array.from(triangles)),
    dataArray("offsets", "Int32", offsets),
    dataArray("types", "UInt8", new Uint8Array(cells).fill(TRIANGLE)),
    `</Cells>`,
    `</Piece>`,
    `</UnstructuredGrid>`,
    `</VTKFile>`,
    ``,
  ].join("\n");
}

/** The time series. @param snapshots file name and time [s] of each snapshot, ascending */
export function pvdSeries(snapshots: readonly { readonly file: string; readonly time: number }[]): string {
  return [
    `<?xml version="1.0"?>`,
    `<VTKFile type="Collection" version="1.0" byte_order="LittleEndian">`,
    `<Collection>`,
    ...snapshots.map(({ file, time }) => `<DataSet timestep="${time}" part="0" file="${escaped(file)}"/>`),
    `</Collection>`,
    `</VTKFile>`,
    ``,
  ].join("\n");
}

type Numbers = Float64Array | Float32Array | Int32Array | Uint16Array | Uint8Array;

function dataArray(name: string, type: string, values: Numbers, more = ""): string {
  const bytes = new Uint8Array(8 + values.byteLength);
  new DataView(bytes.buffer).setBigUint64(0, BigInt(values.byteLength), true);
  bytes.set(new Uint8Array(values.buffer, values.byteOffset, values.byteLength), 8);
  return `<DataArray type="${type}" Name="${name}" ${more} format="binary">${base64(bytes)}</DataArray>`;
}

const escaped = (text: string): string =>
  text.replaceAll("&", "&amp;").replaceAll('"', "&quot;").replaceAll("<", "&lt;");

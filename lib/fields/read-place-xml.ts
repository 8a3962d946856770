import { gpx, kml } from "@tmcw/togeojson";
import { BoundaryFileFailure } from "@/lib/fields/boundary-file-error";
import { closeTracks, type ClosedTracks } from "@/lib/fields/close-tracks";
import { readXmlDocument } from "@/lib/fields/read-xml-document";

/** Geometries of a KML, or polygons made of the closed tracks and routes of a GPX. @throws BoundaryFileFailure */
export function readPlaceXml(text: string): ClosedTracks {
  const document = readXmlDocument(text);
  const kind = document.documentElement?.localName;
  if (kind === "kml") return { places: kml(document), notes: [] };
  if (kind === "gpx") return closeTracks(gpx(document));
  throw new BoundaryFileFailure(
    "unknown-file-kind",
    `The XML is neither KML nor GPX: its outermost element is <${kind ?? ""}>.`,
  );
}

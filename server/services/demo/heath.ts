/**
 * The boundary of Brannet Heath, a place that does not exist: an outline and a pond in it, in whole metres east and north
 * of a middle point on plain farmland.
 */
const OUTLINE = `
  336,3 321,14 313,23 292,39 290,49 270,59 261,68 240,76 227,80 216,88 210,95 188,97 175,103 169,107 160,115
  150,122 142,129 134,136 129,144 123,154 116,165 111,183 104,190 93,196 85,209 71,231 60,239 39,245 26,254
  14,266 -14,268 -23,271 -43,281 -63,277 -93,280 -105,281 -129,272 -148,277 -165,270 -180,255 -204,249
  -210,235 -225,230 -231,206 -240,188 -247,173 -258,163 -255,149 -261,132 -263,118 -256,106 -258,91 -259,82
  -270,70 -273,57 -277,50 -290,36 -295,25 -308,14 -309,2 -316,-11 -328,-25 -327,-44 -332,-52 -320,-65
  -313,-81 -307,-97 -294,-103 -281,-114 -267,-120 -246,-124 -223,-130 -205,-137 -186,-136 -177,-138 -166,-145
  -154,-151 -141,-154 -130,-160 -122,-174 -117,-182 -105,-186 -94,-204 -80,-208 -74,-223 -53,-229 -40,-231
  -27,-244 -10,-244 10,-240 29,-243 43,-238 57,-233 68,-233 93,-227 101,-222 120,-216 129,-214 151,-211
  173,-213 183,-206 209,-202 233,-204 242,-196 271,-191 278,-185 306,-172 316,-161 335,-150 339,-138 351,-124
  356,-113 355,-95 362,-80 355,-59 359,-44 346,-30 344,-16
`;

const POND = `
  -22,39 -27,45 -35,49 -42,55 -48,62 -55,65 -71,71 -83,66 -91,63 -97,56 -104,48 -106,39 -103,30 -95,25 -82,20
  -76,16 -69,14 -54,10 -43,9 -30,10 -18,19 -15,29
`;

export const HEATH_MIDDLE = { lng: -0.644, lat: 53.312 };
/** Metres in a degree at that latitude, near enough for a made-up shape. */
export const METRES_PER_DEGREE = { east: 66_640, north: 111_310 };

/** The heath as a GeoJSON file, as somebody would have drawn and saved it. */
export function heathFile(): { readonly name: string; readonly bytes: Uint8Array } {
  const collection = {
    type: "FeatureCollection",
    features: [
      {
        type: "Feature",
        properties: { name: "Brannet Heath", source: "walked with a GPS unit, spring" },
        geometry: { type: "Polygon", coordinates: [ringOf(OUTLINE), ringOf(POND).reverse()] },
      },
    ],
  };
  return { name: "brannet-heath.geojson", bytes: new TextEncoder().encode(`${JSON.stringify(collection)}\n`) };
}

/** Longitude and latitude with seven decimals, about a centimetre; closed. */
function ringOf(text: string): [number, number][] {
  const points = text
    .trim()
    .split(/\s+/)
    .map((pair): [number, number] => {
      const [east = Number.NaN, north = Number.NaN] = pair.split(",").map(Number);
      return [
        Number((HEATH_MIDDLE.lng + east / METRES_PER_DEGREE.east).toFixed(7)),
        Number((HEATH_MIDDLE.lat + north / METRES_PER_DEGREE.north).toFixed(7)),
      ];
    });
  const [first] = points;
  return first ? [...points, first] : points;
}

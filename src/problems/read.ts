/** Sentences about files, units, sizes and pairing. */
export const readSentences = {
  'file-unrecognised': (d: { file: string; why?: string }) => `${d.file} is not a format Evenglow reads${d.why === undefined ? '' : ` (${d.why})`}.`,
  'file-empty': (d: { file: string }) => `${d.file} is empty; export it again.`,
  'file-truncated': (d: { file: string; place: string; needed: number; present: number }) =>
    `${d.file} ends too early: ${d.place} needs ${d.needed} bytes and ${d.present} are there; copy or export the file again.`,
  'file-absent': (d: { sample: string; file: string; by: string }) => `${d.sample}: ${d.by} names ${d.file}, which is not among the files; add it or correct the name.`,
  'tiff-damaged': (d: { file: string; place: string; reason: string }) => `${d.file}, ${d.place}: ${d.reason}; export the file again.`,
  'tiff-colour': (d: { file: string; place: string }) => `${d.file}, ${d.place} is a coloured picture, not data; export the numbers themselves.`,
  'tiff-bilevel': (d: { file: string; place: string; bits: number }) =>
    `${d.file}, ${d.place} has ${d.bits} bit per pixel, which is a drawing, not data; export the numbers with 8 bits or more.`,
  'tiff-samples': (d: { file: string; place: string; samples: number }) =>
    `${d.file}, ${d.place} has ${d.samples} values per pixel; write one channel per page or per file.`,
  'tiff-type': (d: { file: string; place: string; type: string }) => `${d.file}, ${d.place} holds ${d.type}, which is not read; export it as 32-bit floating point.`,
  'tiff-compression': (d: { file: string; place: string; compression: number }) =>
    `${d.file}, ${d.place} uses compression ${d.compression}, which is not read; export it uncompressed or with deflate.`,
  'tiff-statement': (d: { file: string; reason: string }) => `${d.file}: its Evenglow description ${d.reason}.`,
  'npy-shape': (d: { file: string; dimensions: number; shape: string }) =>
    `${d.file} holds an array of ${d.dimensions} dimensions (shape ${d.shape}), a map has 2; save one map per file.`,
  'npy-type': (d: { file: string; type: string }) => `${d.file} holds values of type ${d.type}, a map needs plain real numbers; save it as float32.`,
  'npy-damaged': (d: { file: string; reason: string }) => `${d.file}: ${d.reason}; save the array again.`,
  'matrix-ragged': (d: { file: string; line: number; found: number; firstLine: number; expected: number }) =>
    `${d.file}, line ${d.line} has ${d.found} values where line ${d.firstLine} has ${d.expected}; every row of a map has the same number.`,
  'matrix-value': (d: { file: string; line: number; column: number; value: string }) =>
    `${d.file}, line ${d.line}, column ${d.column}: "${d.value}" is not a number; write the number, or nan where it is missing.`,
  'map-too-large': (d: { file: string; columns: number; rows: number; limit: number }) =>
    `${d.file} claims ${d.columns} × ${d.rows} pixels, more than the ${d.limit} that are read; crop the map or reduce its resolution.`,
  'map-too-small': (d: { file: string; columns: number; rows: number; least: number }) =>
    `${d.file} has ${d.columns} × ${d.rows} values; a map needs at least ${d.least} × ${d.least}.`,
  'channel-missing': (d: { file: string }) => `${d.file}: every value is missing; export the channel again.`,
  'map-constant': (d: { file: string; quantity: string; value: string }) =>
    `${d.file}: every ${d.quantity} value is ${d.value}; the channel was not recorded, export another one.`,
  'map-flat': (d: { file: string; spanPm: string }) =>
    `${d.file}: the height spans only ${d.spanPm} pm from lowest to highest, less than any surface; correct its unit with --set scan.heightUnit=nm.`,
  'unit-mismatch': (d: { file: string; quantity: string; unit: string; way: string }) =>
    `${d.file} is taken for a ${d.quantity} but its unit is ${d.unit}; ${d.way}.`,
  'unit-disagreement': (d: { file: string; stated: string; asked: string; by: string }) =>
    `${d.file} says that its values are in ${d.stated}, ${d.by} says ${d.asked}; correct or leave out ${d.by}.`,
  'unit-overridden': (d: { file: string; stated: string; statedBy: string; used: string; by: string }) =>
    `${d.file}: ${d.statedBy} gives its unit as ${d.stated}; ${d.used} was used, as ${d.by} asks.`,
  'role-disagreement': (d: { file: string; byName: string; byFile: string }) =>
    `${d.file} is called a ${d.byName} but says inside that it is a ${d.byFile}; rename it or export the other channel.`,
  'statements-missing': (d: { sample: string; what: string; options: string }) => `${d.sample}: nothing states ${d.what}; add ${d.options}.`,
  'size-disagreement': (d: { file: string; axis: string; first: string; firstUm: string; second: string; secondUm: string; way: string }) =>
    `${d.file}: the map is ${d.firstUm} µm ${d.axis} by ${d.first} but ${d.secondUm} µm by ${d.second}; ${d.way}.`,
  'size-assumed': (d: { file: string; pitchXUm: string; pitchYUm: string }) =>
    `${d.file}: its pixel scale states no unit and was taken for ${d.pitchXUm} × ${d.pitchYUm} µm per pixel; set scan.widthUm if that is wrong.`,
  'size-overridden': (d: { file: string; axis: string; first: string; firstUm: string; second: string; secondUm: string }) =>
    `${d.file}: the map is ${d.secondUm} µm ${d.axis} by ${d.second}; ${d.firstUm} µm from ${d.first} was used instead.`,
  'grid-mismatch': (d: { sample: string; first: string; second: string; firstSize: string; secondSize: string }) =>
    `${d.sample}: ${d.first} is ${d.firstSize} but ${d.second} is ${d.secondSize}; all channels of a sample lie on one grid, so export them from the same scan.`,
  'role-twice': (d: { sample: string; first: string; second: string; role: string }) =>
    `${d.sample}: ${d.first} and ${d.second} are both its ${d.role}; keep one, or mark the other in its name (.return, .5V).`,
  'role-unknown-pages': (d: { file: string; pages: number; example: string }) =>
    `${d.file} has ${d.pages} maps and none says whether it is a height or a current; name the pages, or add a sidecar with "height":"${d.example}#1" and "current":"${d.example}#2".`,
  'page-absent': (d: { sample: string; file: string; page: number; pages: number }) =>
    `${d.sample}: ${d.file}#${d.page} is asked for, but the file has ${d.pages === 1 ? 'one map' : `${d.pages} maps`}; pages count from 1.`,
  'channel-ignored': (d: { source: string; file: string }) => `${d.source} is neither a height nor a current by its name and was left out; name the page in ${d.file} if it is one.`,
  'bias-disagreement': (d: { file: string; first: string; firstV: number; second: string; secondV: number }) =>
    `${d.file}: ${d.first} gives ${d.firstV} V but ${d.second} gives ${d.secondV} V; correct the wrong one, or decide with --set scan.biasV.`,
  'bias-overridden': (d: { file: string; statedV: number; usedV: number; by: string }) => `${d.file}: ${d.by} gives ${d.statedV} V; scan.biasV = ${d.usedV} V was used instead.`,
  'sample-no-map': (d: { sample: string }) => `${d.sample} names no map; give its height or its current.`,
  'sidecar-ignored': (d: { file: string }) => `${d.file} holds none of Evenglow's keys and was ignored; widthUm, heightUnit, currentUnit and biasV are the usual ones.`,
  'sidecar-unknown-key': (d: { file: string; keys: string; known: string }) => `${d.file}: ${d.keys} is not known and was ignored; known are ${d.known}.`,
  'sidecar-value': (d: { file: string; place: string; reason: string }) => `${d.file}, ${d.place}: ${d.reason}.`,
  'sidecar-not-json': (d: { file: string; reason: string }) => `${d.file} is not valid JSON (${d.reason}); correct or remove it.`,
  'sidecar-disagreement': (d: { sample: string; key: string; first: string; firstValue: string; second: string; secondValue: string }) =>
    `${d.sample}: ${d.first} says ${d.key} ${d.firstValue}, ${d.second} says ${d.secondValue}; correct one of them.`,
  'manifest-sample': (d: { file: string; line: number; reason: string }) => `${d.file}, line ${d.line}: ${d.reason}.`,
  'file-unpaired': (d: { file: string; reason: string }) => `${d.file} cannot be used: ${d.reason}.`,
  'outlines-not-json': (d: { file: string; reason: string }) => `${d.file} is not valid GeoJSON (${d.reason}); export the outlines again.`,
  'outlines-layer': (d: { file: string; place: string; found: string; known: string }) => `${d.file}, ${d.place}: its layer ${d.found}; use one of ${d.known}.`,
  'outlines-shape': (d: { file: string; place: string; reason: string }) => `${d.file}, ${d.place}: ${d.reason}.`,
  'footprint-empty': (d: { sample: string; file: string }) =>
    `${d.sample}: the outlines of ${d.file} leave no pixel of the map inside injector, barrier and emitter; check that they are in µm from the map's lower-left corner.`,
};

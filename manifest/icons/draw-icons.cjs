/**
 * Draws the add-in's icons: `node manifest/icons/draw-icons.cjs [folder]`.
 *
 * A square tile with three rows of a plan; the chosen one is the lightest. Drawn by sampling each pixel eight by eight
 * times, and written as PNG by hand (W3C, Portable Network Graphics, §11 chunks, §10 compression).
 */
const { crc32, deflateSync } = require('node:zlib');
const { writeFileSync } = require('node:fs');
const path = require('node:path');

/** Pixels a side: 16, 32 and 80 for the ribbon, 32 and 64 for lists of add-ins, 128 for a page in a store. */
const sizes = [16, 32, 64, 80, 128];
const samplesPerSide = 8;

const tile = [31, 58, 77];
const row = [122, 160, 178];
const chosenRow = [244, 201, 93];

/** Rounded rectangles in a square of side 16, the later ones above: left, top, right, bottom, radius, colour. */
const shapes = [
  [0, 0, 16, 16, 2.5, tile],
  [3, 3.25, 10, 5.75, 0.5, row],
  [3, 6.75, 13, 9.25, 0.5, chosenRow],
  [3, 10.25, 8, 12.75, 0.5, row],
];

/** Colour of the uppermost shape at a point, or undefined outside the tile. */
function colorAt(x, y) {
  let color;
  for (const [left, top, right, bottom, radius, fill] of shapes) {
    const dx = Math.max(left + radius - x, x - right + radius, 0);
    const dy = Math.max(top + radius - y, y - bottom + radius, 0);
    if (dx * dx + dy * dy <= radius * radius) {
      color = fill;
    }
  }
  return color;
}

/** Red, green, blue, opacity of each pixel, row by row, each row after a filter byte of 0. */
function drawRows(size) {
  const bytes = Buffer.alloc(size * (1 + size * 4));
  let at = 0;
  for (let y = 0; y < size; y++) {
    at++;
    for (let x = 0; x < size; x++) {
      const sum = [0, 0, 0];
      let covered = 0;
      for (let sample = 0; sample < samplesPerSide * samplesPerSide; sample++) {
        const dx = ((sample % samplesPerSide) + 0.5) / samplesPerSide;
        const dy = (Math.floor(sample / samplesPerSide) + 0.5) / samplesPerSide;
        const color = colorAt(((x + dx) * 16) / size, ((y + dy) * 16) / size);
        if (color !== undefined) {
          covered++;
          color.forEach((part, position) => (sum[position] += part));
        }
      }
      for (const part of sum) {
        bytes[at++] = covered === 0 ? 0 : Math.round(part / covered);
      }
      bytes[at++] = Math.round((255 * covered) / (samplesPerSide * samplesPerSide));
    }
  }
  return bytes;
}

function chunk(type, content) {
  const named = Buffer.concat([Buffer.from(type, 'latin1'), content]);
  const length = Buffer.alloc(4);
  const checksum = Buffer.alloc(4);
  length.writeUInt32BE(content.length);
  checksum.writeUInt32BE(crc32(named));
  return Buffer.concat([length, named, checksum]);
}

function png(size) {
  const header = Buffer.alloc(13);
  header.writeUInt32BE(size, 0);
  header.writeUInt32BE(size, 4);
  // Eight bits a part, red-green-blue-opacity.
  header.set([8, 6, 0, 0, 0], 8);
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', header),
    chunk('IDAT', deflateSync(drawRows(size), { level: 9 })),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

const folder = process.argv[2] ?? __dirname;
for (const size of sizes) {
  writeFileSync(path.join(folder, `icon-${size}.png`), png(size));
}

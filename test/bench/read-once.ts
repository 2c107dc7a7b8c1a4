// Reads one meter file and prints as JSON how long it took, the record's length and the most memory the process held.
//   read-once FILE
import { statSync } from 'node:fs';
import { fileChunks } from '#libs/meter-files/file-chunks.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';

const path = process.argv[2]!;
const start = process.hrtime.bigint();
const { record, quality } = await readMeterFile(fileChunks(path), { sizeBytes: statSync(path).size });
const ns = Number(process.hrtime.bigint() - start);
const memoryMb = (process.resourceUsage().maxRSS * 1024) / 1e6;
console.log(JSON.stringify({ ns, intervals: record.beginS.length, rows: quality.rowsRead, memoryMb }));

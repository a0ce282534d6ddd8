// The CSV reader of an embedded SQL engine on the same file, one thread, every column brought into JavaScript.
import { DuckDBInstance } from '@duckdb/node-api';

const [path] = process.argv.slice(2);
const instance = await DuckDBInstance.create(':memory:', { threads: '1' });
const connection = await instance.connect();
const before = process.cpuUsage();
const columns =
  "{'time':'TIMESTAMPTZ','base':'VARCHAR','mark':'VARCHAR','rover':'VARCHAR','crew':'VARCHAR','latitude':'DOUBLE','longitude':'DOUBLE','height':'DOUBLE','fix':'VARCHAR','satellites':'DOUBLE','pdop':'DOUBLE','age':'DOUBLE'}";
const result = await connection.stream(
  `SELECT * FROM read_csv('${path.replaceAll("'", "''")}', columns=${columns}, auto_detect=false, header=true)`,
);
let rows = 0;
let sum = 0;
for (;;) {
  const chunk = await result.fetchChunk();
  if (chunk === null || chunk.rowCount === 0) break;
  rows += chunk.rowCount;
  for (let column = 0; column < chunk.columnCount; column++) {
    const vector = chunk.getColumnVector(column);
    for (let k = 0; k < chunk.rowCount; k++) if (vector.getItem(k) !== null) sum += 1;
  }
}
const { user, system } = process.cpuUsage(before);
console.log(JSON.stringify({ cpuSeconds: (user + system) / 1e6, rows, sum }));

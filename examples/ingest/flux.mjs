// Gets one number, sends a file, and sums it up, with the fetch of Node 18 and later:  node flux.mjs [FILE]
// The service is at CATSPAW_URL.
import { readFile, writeFile } from "node:fs/promises";
import { basename } from "node:path";
import { fileURLToPath } from "node:url";

const url = process.env.CATSPAW_URL ?? "http://127.0.0.1:8660";
const file = process.argv[2] ?? fileURLToPath(new URL("stations.csv", import.meta.url));

async function ask(path, options) {
  const answer = await fetch(url + path, { signal: AbortSignal.timeout(120_000), ...options });
  const text = await answer.text();
  if (!answer.ok) throw new Error(text.startsWith("{") ? JSON.parse(text).detail : `${answer.status} ${text}`);
  return text;
}

try {
  const question = new URLSearchParams({
    gas: "co2",
    water_temperature: 18.4,
    salinity: 35.1,
    wind_speed: "15 kn",
    water_fugacity: 372.4,
    air_fugacity: 409.1,
    form: "number",
  });
  console.log(`one number: ${Number(await ask(`/v1/flux?${question}`))} mmol m-2 d-1`);

  const answered = await ask("/v1/flux?gas=co2", { method: "POST", body: await readFile(file) });
  await writeFile(basename(file).replace(/\.csv$/, "_flux.csv"), answered);

  // Number("") is 0: blank cells go first. The reason is last and may hold commas.
  const [header, ...rows] = answered.trimEnd().split("\n").map((line) => line.split(","));
  const place = header.indexOf("flux [mmol m-2 d-1]");
  const flux = rows.map((cells) => cells[place]).filter((cell) => cell !== "").map(Number);
  const mean = (flux.reduce((sum, value) => sum + value, 0) / flux.length).toFixed(4);
  console.log(`${basename(file)}: ${rows.length} rows answered, ${flux.length} with a flux, mean ${mean} mmol m-2 d-1`);
} catch (error) {
  console.error(`flux: ${error.message}${error.cause ? `: ${error.cause.message}` : ""}`);
  process.exitCode = 1;
}

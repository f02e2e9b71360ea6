import { FolderStore } from "../../lib/store/folderStore.ts";

// A process of its own for folderStore.test.ts: `node bundle.mjs FOLDER create-race NAME` or `… write-forever NAME`.
const [folder = "", what, name = ""] = process.argv.slice(2);
const store = new FolderStore(folder);

if (what === "create-race") {
  const won: number[] = [];
  for (let i = 0; i < 50; i++) {
    if ((await store.create(`claims/${i}.json`, Buffer.from(name))) === "created") won.push(i);
  }
  console.log(JSON.stringify(won));
} else {
  for (let i = 0; ; i++) {
    const letter = String.fromCharCode(97 + (i % 26));
    await store.write("latest.csv", Buffer.alloc(2_000_000, letter));
    await store.create(`history/${name}-${i}.csv`, Buffer.alloc(300_000, letter));
    console.log("round");
  }
}

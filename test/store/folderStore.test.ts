import { join } from "node:path";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";
import { storeContract } from "./contract.ts";

storeContract("a folder", async () => new FolderStore(join(await temporaryFolder(), "store")));

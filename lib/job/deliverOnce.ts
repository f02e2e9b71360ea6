import type { ObjectStore } from "../store/objectStore.ts";
import { createDocument, readDocument, type Versioned } from "./documents.ts";
import type { DeliveryRecord } from "./summary.ts";

/** Proof that a note arrived. Holds no times, so that a retried run writes the same bytes. */
interface DeliveredDocument extends Versioned {
  readonly id: string;
  readonly asOf: string;
  readonly webhook: string;
  readonly audience: DeliveryRecord["audience"];
}

/** How a try ended; the next one may begin at once. */
interface UndeliveredDocument extends DeliveredDocument {
  readonly reason: string;
}

/**
 * One sender's right to post until an instant; a later one may follow when no proof came of it. The first claim without
 * a proof tells the next run what is owed, whatever became of the sender.
 */
export interface ClaimDocument extends DeliveredDocument {
  readonly owner: string;
  readonly untilMilliseconds: number;
}

export interface Posting {
  readonly store: ObjectStore;
  /** Where claim, proof and mark stand: `runs/<asOf>/`. */
  readonly prefix: string;
  /** Last part of their names: the audience, with the webhook's name where an audience has several. */
  readonly name: string;
  readonly document: DeliveredDocument;
  /** Names this process in its claims, for people who look. */
  readonly owner: string;
  /** The longest a post may take. */
  readonly leaseMilliseconds: number;
  readonly clock: () => number;
  readonly sleep: (milliseconds: number) => Promise<void>;
  /** Posts the note: `undefined` when it arrived, else why not. */
  readonly post: () => Promise<string | undefined>;
}

const pollMilliseconds = 200;
/** Many dead senders in a row mean that something else is wrong; the note then stays owed. */
const mostClaims = 20;

/**
 * Posts a note at most once among any number of processes, as long as none of them dies.
 *
 * Senders claim the note by creating `delivering-<name>.json`; the first one posts, the others wait for its proof.
 * When a claim failed (`undelivered-<name>.json`) or ran out (its owner died), the next one in the row may be made. So a note is
 * never lost, and can arrive twice only when a sender died between the webhook's answer and the proof; both
 * posts then carry the same id.
 */
export async function deliverOnce(posting: Posting): Promise<Pick<DeliveryRecord, "status" | "reason">> {
  const { store, prefix, name, clock } = posting;
  const proofKey = `${prefix}delivered-${name}.json`;
  for (let number = 1; number <= mostClaims; number++) {
    const ending = `${name}${number === 1 ? "" : `.${number}`}.json`;
    const markKey = `${prefix}undelivered-${ending}`;
    if (await readDocument(store, proofKey)) return { status: "already-delivered" };
    if (await readDocument(store, markKey)) continue; // this try is over; the note is still owed
    const own: ClaimDocument = {
      ...posting.document,
      owner: posting.owner,
      untilMilliseconds: clock() + posting.leaseMilliseconds,
    };
    const claim = await createDocument(store, `${prefix}delivering-${ending}`, own);
    // Ours only when this very call wrote it: two tries of one invocation share their owner, and perhaps the moment.
    if (claim !== own) {
      while (clock() < claim.untilMilliseconds) {
        if (await readDocument(store, proofKey)) return { status: "already-delivered" };
        const mark = await readDocument<UndeliveredDocument>(store, markKey);
        if (mark) return { status: "undelivered", reason: mark.reason };
        await posting.sleep(pollMilliseconds);
      }
      continue; // its owner died
    }
    const reason = await posting.post();
    if (reason === undefined) {
      await createDocument(store, proofKey, posting.document);
      return { status: "delivered" };
    }
    await createDocument<UndeliveredDocument>(store, markKey, { ...posting.document, reason });
    return { status: "undelivered", reason };
  }
  return { status: "undelivered", reason: `tried ${mostClaims} times in all` };
}

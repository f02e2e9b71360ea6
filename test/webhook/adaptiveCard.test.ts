import { createRequire } from "node:module";
import type * as AdaptiveCards from "adaptivecards";
import { describe, expect, it } from "vitest";
import { composeBody } from "../../lib/webhook/composeBody.ts";
import { analystMessage } from "../../lib/words/analystMessage.ts";
import { businessMessage } from "../../lib/words/businessMessage.ts";
import { operationsMessage } from "../../lib/words/operationsMessage.ts";
import { britishVoice, loansRun } from "../support/factsFixture.ts";
import { hardRun } from "../support/hardFacts.ts";

// The published JSON schema comes in no package; the format's own reference parser (npm `adaptivecards`) does, and
// reports every unknown element, property of a wrong type or value, and feature newer than the card's version.
const { AdaptiveCard, SerializationContext } = createRequire(import.meta.url)(
  "adaptivecards/dist/adaptivecards.js",
) as typeof AdaptiveCards;

function faults(content: unknown): string[] {
  const context = new SerializationContext();
  const card = new AdaptiveCard();
  card.parse(content, context);
  const parsing = Array.from({ length: context.eventCount }, (_, index) => context.getEventAt(index).message);
  return [...parsing, ...card.validateProperties().validationEvents.map((event) => event.message)];
}

const contentOf = (body: string) => JSON.parse(body).attachments[0].content;

describe("the card body", () => {
  for (const [audience, compose] of Object.entries({ businessMessage, analystMessage, operationsMessage })) {
    it(`of ${audience} is a card that the reference parser takes without a fault`, () => {
      for (const run of [loansRun, hardRun]) {
        const content = contentOf(composeBody(compose(run, britishVoice), "card").body);
        expect(content.body.length).toBeGreaterThan(2);
        expect(faults(content)).toEqual([]);
      }
    });
  }

  it("is judged by a parser that does refuse a wrong card", () => {
    const content = contentOf(composeBody(businessMessage(loansRun, britishVoice), "card").body);
    expect(faults({ ...content, body: [{ type: "Paragraph" }] })).not.toEqual([]);
    expect(faults({ ...content, body: [{ type: "TextBlock", text: "x", size: "Gigantic" }] })).not.toEqual(
      [],
    );
  });
});

"use client";

import { DelayCurve } from "@/components/cleaning/delay-curve";
import { sayChannelDelay, sayDelay } from "@/components/cleaning/say-delay";
import { useDelayActions, useDelays, type DelayActions } from "@/components/cleaning/use-delays";
import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { ProgressBar } from "@/components/ui/progress-bar";
import { StateWord } from "@/components/ui/state-mark";
import { useUnits } from "@/components/units/use-units";
import { describeFailure } from "@/lib/api/api-problem";
import { channelWords } from "@/lib/legend/channel-words";
import type { ChannelDelay, DelaysBody } from "@/lib/schemas/alignment";

/** Whether channels were written down late, how sure that is, and taking it out. */
export function DelaySection({ logId, mayChange }: { logId: string; mayChange: boolean }) {
  const delays = useDelays(logId);
  const actions = useDelayActions(logId);
  const failure = actions.ask.error ?? actions.put.error;
  return (
    <section aria-labelledby="delays-title" className="space-y-3">
      <h2 id="delays-title" className="text-section">
        Delay of the channels
      </h2>
      <p className="max-w-prose text-table text-ink-soft">
        A sensor that is read late puts its readings too far along the way. Neighbouring passes driven in opposite
        directions then disagree along every edge on the ground; the delay at which they agree best is the sensor’s.
      </p>
      {failure ? (
        <Notice state="act" urgent title="Not done">
          {describeFailure(failure)}
        </Notice>
      ) : null}
      {delays.isError ? (
        <Notice state="act" urgent title="The delays could not be fetched">
          {describeFailure(delays.error)}
        </Notice>
      ) : null}
      {delays.data ? <DelayBody delays={delays.data} mayChange={mayChange} actions={actions} /> : null}
    </section>
  );
}

interface DelayBodyProps {
  delays: DelaysBody;
  mayChange: boolean;
  actions: DelayActions;
}

function DelayBody({ delays, mayChange, actions }: DelayBodyProps) {
  const { state, progress, items } = delays;
  return (
    <div className="space-y-4">
      {state === "working" ? (
        <div className="max-w-md space-y-2">
          <p role="status">Comparing neighbouring passes…</p>
          <ProgressBar share={progress} label="Comparing neighbouring passes" />
        </div>
      ) : null}
      {state === "failed" ? (
        <Notice state="look">The delays could not be worked out last time. Looking again starts anew.</Notice>
      ) : null}
      {state === "none" ? <p className="text-ink-soft">Nobody has looked for delays in this log yet.</p> : null}
      {items.length > 0 ? (
        <ul className="divide-y divide-rule border-y border-rule">
          {items.map((item) => (
            <DelayLine key={item.channel} item={item} mayChange={mayChange} actions={actions} />
          ))}
        </ul>
      ) : null}
      {mayChange && state !== "working" ? (
        <Button disabled={actions.ask.isPending} onClick={() => actions.ask.mutate()}>
          {state === "none" ? "Look for delays" : "Look again"}
        </Button>
      ) : null}
    </div>
  );
}

function DelayLine({ item, mayChange, actions }: { item: ChannelDelay; mayChange: boolean; actions: DelayActions }) {
  const { system } = useUnits();
  return (
    <li className="grid gap-x-8 gap-y-3 py-4 md:grid-cols-[minmax(0,1fr)_minmax(0,22rem)]" data-channel={item.channel}>
      <div className="min-w-0 space-y-2">
        <h3 className="font-semibold">{channelWords(item.channel).name}</h3>
        {sayChannelDelay(item, system).map((sentence) => (
          <p key={sentence} className="max-w-prose">
            {sentence}
          </p>
        ))}
        {item.applied ? <StateWord state="fine">{`${sayDelay(item.applied)} are taken out`}</StateWord> : null}
        {mayChange ? <DelayButtons item={item} actions={actions} /> : null}
        <details className="text-table text-ink-soft">
          <summary className="inline-flex min-h-11 items-center text-slate md:min-h-6">How this was worked out</summary>
          <p className="max-w-prose">{item.method}</p>
        </details>
      </div>
      <DelayCurve item={item} />
    </li>
  );
}

function DelayButtons({ item, actions }: { item: ChannelDelay; actions: DelayActions }) {
  const { channel, delayS, applied } = item;
  const name = channelWords(channel).name;
  const rounded = delayS === null ? 0 : Number(delayS.toFixed(1));
  const isOffered = item.state === "estimated" && rounded !== 0 && rounded !== applied;
  const put = (seconds: number, note: string) => actions.put.mutate({ delaysS: { [channel]: seconds }, note });
  return (
    <div className="flex flex-wrap gap-2">
      {isOffered ? (
        <Button
          disabled={actions.put.isPending}
          aria-label={`Use ${sayDelay(rounded)} for ${name}`}
          onClick={() => put(rounded, `${name}: ${sayDelay(rounded)} of delay taken out`)}
        >
          Use {sayDelay(rounded)}
        </Button>
      ) : null}
      {applied ? (
        <Button
          kind="quiet"
          disabled={actions.put.isPending}
          aria-label={`Put ${name} back as logged`}
          onClick={() => put(0, `${name}: delay left in again`)}
        >
          Back as logged
        </Button>
      ) : null}
    </div>
  );
}

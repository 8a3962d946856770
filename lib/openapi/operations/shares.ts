import type { Operation } from "@/lib/openapi/operation";
import { TileQuery, tileReplies } from "@/lib/openapi/operations/readings";
import { ListQuery } from "@/lib/schemas/listing";
import { TileJson } from "@/lib/schemas/logs";
import { SharedView, SharePasscode } from "@/lib/schemas/shared";
import { Share, ShareCreated, ShareInput, ShareList } from "@/lib/schemas/shares";

const tag = "Shares";

const ownerOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/fields/{fieldId}/shares",
    tag,
    permission: "shares.read",
    summary: "Shares of a field, newest first",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of shares, without their addresses", schema: ShareList }],
  },
  {
    method: "POST",
    path: "/api/v1/fields/{fieldId}/shares",
    tag,
    permission: "shares.write",
    summary: "Share a field by a link",
    description:
      "`url` is shown in this reply only. Without `logId` the newest seeding log of the field at this moment is shared. " +
      "`blurLocation` moves every shape to 0° N 0° E and gives no tiles. `allowDownload` must stay false for now. " +
      "`emailed` says whether the link was mailed to `emailTo`; a person may mail 20 links an hour, an organisation 50.",
    body: ShareInput,
    replies: [{ status: 201, description: "The share with its address", schema: ShareCreated }],
    errors: ["too_many_requests"],
  },
  {
    method: "GET",
    path: "/api/v1/shares/{shareId}",
    tag,
    permission: "shares.read",
    summary: "One share",
    replies: [{ status: 200, description: "The share, without its address", schema: Share }],
  },
  {
    method: "DELETE",
    path: "/api/v1/shares/{shareId}",
    tag,
    permission: "shares.write",
    summary: "Withdraw a share",
    description: "The link says 410 from then on. Withdrawing it again is fine.",
    replies: [{ status: 204, description: "Withdrawn" }],
  },
];

export const shareOperations: Operation[] = [
  ...ownerOperations,
  {
    method: "GET",
    path: "/api/v1/shared/{token}",
    tag,
    permission: "public",
    summary: "What a share link shows",
    description: "404 for an unknown link, 410 for one expired or withdrawn, 401 while its passcode was not given.",
    replies: [{ status: 200, description: "The shared layers and nothing else", schema: SharedView }],
    errors: ["unauthorized", "gone", "too_many_requests"],
  },
  {
    method: "POST",
    path: "/api/v1/shared/{token}/passcode",
    tag,
    permission: "public",
    summary: "Give the passcode of a link",
    description: "Sets a cookie that opens the link for 12 hours.",
    body: SharePasscode,
    replies: [{ status: 204, description: "Right; the cookie is set" }],
    errors: ["unauthorized", "gone", "too_many_requests"],
  },
  {
    method: "GET",
    path: "/api/v1/shared/{token}/tiles/{channel}/tiles.json",
    tag,
    permission: "public",
    summary: "TileJSON 3 of a shared channel",
    replies: [{ status: 200, description: "TileJSON", schema: TileJson }],
    errors: ["unauthorized", "gone", "too_many_requests"],
  },
  {
    method: "GET",
    path: "/api/v1/shared/{token}/tiles/{channel}/{z}/{x}/{y}.png",
    tag,
    permission: "public",
    summary: "A tile of a shared channel",
    query: TileQuery,
    replies: tileReplies,
    errors: ["unauthorized", "gone", "too_many_requests"],
  },
];

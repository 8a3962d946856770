import { withPublic } from "@/app/_server/with-scope";
import { AppError } from "@/lib/errors";

const refusePath = withPublic(async ({ url }) => {
  throw new AppError(
    "not_found",
    `There is no ${url.pathname} in this API. GET /api/v1/openapi.json lists what there is.`,
  );
});

export { refusePath as GET, refusePath as POST, refusePath as PUT, refusePath as PATCH, refusePath as DELETE };

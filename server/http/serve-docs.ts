import { Router } from "express";
import swaggerUi from "swagger-ui-express";

/** The try-it page, from our own origin: no outside host, no validator call, the credential in memory only. */
export function serveDocs(): Router {
  const router = Router();
  const page = swaggerUi.setup(null, {
    customSiteTitle: "Borewright API",
    swaggerOptions: {
      url: "/openapi.json",
      docExpansion: "list",
      defaultModelsExpandDepth: 0,
      persistAuthorization: false,
      validatorUrl: null,
      displayRequestDuration: true,
    },
  });
  router.use(
    "/docs",
    (_request, response, next) => {
      response.locals.route = "/docs";
      next();
    },
    ...swaggerUi.serve,
    page,
  );
  return router;
}

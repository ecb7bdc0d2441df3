export const docsPage = `<!doctype html>
<html lang="en">
  <head>
    <meta charset="utf-8" />
    <meta name="viewport" content="width=device-width, initial-scale=1" />
    <title>Interface of Quartzhold</title>
    <link rel="icon" type="image/svg+xml" href="/favicon.svg" />
    <link rel="stylesheet" href="/api/docs/swagger-ui.css" />
    <link rel="stylesheet" href="/api/docs/colours.css" />
  </head>
  <body>
    <main id="docs"><p>The description is also at <a href="/api/openapi.json">/api/openapi.json</a>.</p></main>
    <script src="/api/docs/swagger-ui-bundle.js"></script>
    <script src="/api/docs/start.js"></script>
  </body>
</html>
`;

/** Requests tried from the page carry the header that tells our pages from foreign ones. */
export const docsScript = `SwaggerUIBundle({
  url: '/api/openapi.json',
  dom_id: '#docs',
  deepLinking: true,
  docExpansion: 'none',
  defaultModelsExpandDepth: 0,
  validatorUrl: null,
  requestInterceptor(request) {
    request.headers['X-Quartzhold'] = '1';
    return request;
  },
});
`;

/** Our own paper, ink and accent; the rest of the page's look stays as it comes. */
export const docsStyle = `
:root { color-scheme: light; }
body { margin: 0; background: #fbf9f6; color: #2c2729; }
#docs > p { padding: 1.5rem; font-family: 'Source Sans 3', 'Segoe UI', sans-serif; }
.swagger-ui, .swagger-ui .info .title, .swagger-ui .opblock-tag, .swagger-ui .opblock .opblock-summary-description {
  font-family: 'Source Sans 3', 'Segoe UI', 'Helvetica Neue', Arial, sans-serif; color: #2c2729;
}
.swagger-ui a, .swagger-ui .info a { color: #5d4690; }
.swagger-ui .btn { border-color: #5d4690; color: #5d4690; border-radius: 3px; }
.swagger-ui .btn.execute { background: #5d4690; color: #ffffff; }
.swagger-ui .btn.authorize { border-color: #5d4690; color: #5d4690; }
.swagger-ui .btn.authorize svg { fill: #5d4690; }
.swagger-ui .info .title small, .swagger-ui .info .title small.version-stamp { background: #6d6467; border-radius: 3px; }
.swagger-ui .markdown code, .swagger-ui .renderedMarkdown code { color: #4a3775; background: #f0ecf6; }
.swagger-ui .opblock.opblock-get, .swagger-ui .opblock.opblock-post, .swagger-ui .opblock.opblock-put,
.swagger-ui .opblock.opblock-delete { background: #ffffff; border-color: #dcd5cf; border-radius: 3px; box-shadow: none; }
.swagger-ui .opblock .opblock-summary { border-color: #dcd5cf; }
.swagger-ui .opblock .tab-header .tab-item.active h4 span::after { background: #5d4690; }
.swagger-ui .opblock.opblock-get .opblock-summary-method { background: #6d6467; }
.swagger-ui .opblock.opblock-post .opblock-summary-method,
.swagger-ui .opblock.opblock-put .opblock-summary-method { background: #5d4690; }
.swagger-ui .opblock.opblock-delete .opblock-summary-method { background: #a3304f; }
.swagger-ui .scheme-container { background: #f0ecf6; box-shadow: none; }
`;

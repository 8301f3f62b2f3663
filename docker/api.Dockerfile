# API and built web in one image; the worker and migrations run from the same files.
FROM node:20-bookworm-slim AS build
WORKDIR /app
COPY . .
RUN npm ci && npm run build

FROM node:20-bookworm-slim
WORKDIR /app
ENV NODE_ENV=production HOST=0.0.0.0 PORT=4180 WEB_DIR=/app/apps/web/dist
COPY --from=build /app /app
USER node
EXPOSE 4180
CMD ["node", "--enable-source-maps", "apps/api/dist/main.mjs"]

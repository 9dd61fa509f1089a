# Two stages: the first has the compiler, the second only what runs.
FROM node:20-bookworm-slim AS build
WORKDIR /build
COPY package.json package-lock.json .npmrc ./
RUN npm ci --include=dev
COPY tsconfig.json tsconfig.build.json ./
COPY tools ./tools
COPY config ./config
COPY templates ./templates
COPY pipeline ./pipeline
COPY simulate ./simulate
COPY store ./store
COPY worker ./worker
COPY report ./report
COPY cli ./cli
RUN node tools/build.mjs

FROM node:20-bookworm-slim
ENV NODE_ENV=production
WORKDIR /app
COPY package.json package-lock.json .npmrc ./
RUN npm ci --omit=dev && npm cache clean --force
COPY --from=build /build/dist ./dist
# The image's own unprivileged account; the workspace volume takes over its owner.
RUN mkdir /workspace && chown node:node /workspace
USER node
ENV SHIFTWORK_WORKSPACE=/workspace
VOLUME ["/workspace"]
ENTRYPOINT ["node", "/app/dist/cli/main.js"]
CMD ["work"]

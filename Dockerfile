# One image for the web server and for workers; the database is a server of its own.
FROM node:20.20.2-bookworm-slim AS build
ENV NEXT_TELEMETRY_DISABLED=1
WORKDIR /srv/rarebound
COPY package.json package-lock.json .npmrc ./
RUN npm ci --include=dev --no-progress
COPY . .
RUN npm run build

FROM node:20.20.2-bookworm-slim
ENV NODE_ENV=production \
    NEXT_TELEMETRY_DISABLED=1 \
    RAREBOUND_DEMO=no \
    RAREBOUND_HOST=0.0.0.0 \
    RAREBOUND_DATA_DIR=/var/lib/rarebound \
    PORT=3210
RUN mkdir -p /var/lib/rarebound && chown node:node /var/lib/rarebound
COPY --from=build --chown=node:node /srv/rarebound /srv/rarebound
WORKDIR /srv/rarebound
USER node
VOLUME /var/lib/rarebound
EXPOSE 3210
HEALTHCHECK --interval=10s --timeout=5s --start-period=60s --retries=6 \
    CMD ["node", "-e", "fetch('http://127.0.0.1:' + process.env.PORT + '/api/ready').then((answer) => process.exit(answer.ok ? 0 : 1), () => process.exit(1))"]
CMD ["npm", "start"]

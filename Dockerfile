# Build a static binary.
FROM golang:1.26 AS build
WORKDIR /source
COPY go.mod go.sum ./
RUN go mod download
COPY . .
RUN CGO_ENABLED=0 go build -trimpath -ldflags="-s -w" -o /out/loopwright ./cmd/loopwright && mkdir -p /out/data

# Run it as nobody in particular, with nothing else in the image. There is no /tmp: the database puts what it cannot hold
# in memory into the folder where it runs.
FROM scratch
COPY --from=build /out/loopwright /loopwright
COPY --from=build --chown=65532:65532 /out/data /data
USER 65532:65532
VOLUME /data
WORKDIR /data
EXPOSE 8080
ENTRYPOINT ["/loopwright", "serve", "--listen", "0.0.0.0:8080", "--database", "/data/loopwright.db"]

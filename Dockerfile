# The program in a container: see "In a container" in README.md for how to run it.

FROM golang:1.26.8-bookworm AS build
WORKDIR /src
COPY go.mod go.sum ./
RUN go mod download
COPY . .
# SQLite is C code, so cgo must be on; the image above brings gcc. Both images
# are of the same Debian release, so that the program finds its C library.
RUN CGO_ENABLED=1 go build -trimpath -ldflags='-s -w' -o /legwright ./cmd/server

FROM debian:bookworm-slim
RUN useradd --system --uid 10001 --user-group --no-create-home --shell /usr/sbin/nologin legwright \
 && install -d -o legwright -g legwright -m 0700 /data
COPY --from=build /legwright /usr/local/bin/legwright
COPY THIRD-PARTY-NOTICES.md /usr/share/doc/legwright/
# A new named volume takes over the owner and mode of /data.
VOLUME /data
EXPOSE 8080
USER legwright
# Inside a container 127.0.0.1 is the container itself, so the program has to
# listen on all addresses and says so in its log. What keeps other computers out
# is the publishing: -p 127.0.0.1:8080:8080, never -p 8080:8080.
# Published under another port or name, it needs that one as well, for example
#   … legwright -hosts 127.0.0.1:9090,localhost:9090
ENTRYPOINT ["/usr/local/bin/legwright", "-listen", "0.0.0.0:8080", "-allow-network", "-data", "/data"]

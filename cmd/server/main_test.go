package main

import (
	"bufio"
	"bytes"
	"context"
	"io"
	"net"
	"net/http"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"sync"
	"testing"
	"time"

	"legwright/internal/store"
)

func noEnv(string) string { return "" }

func env(vars map[string]string) func(string) string {
	return func(name string) string { return vars[name] }
}

// syncBuffer can be read while the server writes its log to it.
type syncBuffer struct {
	mu sync.Mutex
	b  bytes.Buffer
}

func (b *syncBuffer) Write(p []byte) (int, error) {
	b.mu.Lock()
	defer b.mu.Unlock()
	return b.b.Write(p)
}

func (b *syncBuffer) String() string {
	b.mu.Lock()
	defer b.mu.Unlock()
	return b.b.String()
}

type server struct {
	url    string
	log    *syncBuffer
	cancel context.CancelFunc
	ended  chan error
	rest   chan string // what stdout said after the first line
}

// start runs the program until its line on stdout and fails the test if that
// does not come.
func start(t *testing.T, getenv func(string) string, args ...string) *server {
	t.Helper()
	ctx, cancel := context.WithCancel(context.Background())
	s := &server{log: new(syncBuffer), cancel: cancel, ended: make(chan error, 1), rest: make(chan string, 1)}
	out, in := io.Pipe()
	go func() {
		err := run(ctx, args, getenv, in, s.log)
		in.Close()
		s.ended <- err
	}()
	lines := bufio.NewReader(out)
	line, err := lines.ReadString('\n')
	if err != nil {
		t.Fatalf("no line on stdout: %v; %v", err, <-s.ended)
	}
	go func() {
		b, _ := io.ReadAll(lines)
		s.rest <- string(b)
	}()
	m := regexp.MustCompile(`^Legwright is at (http://\S+:\d+/)\n$`).FindStringSubmatch(line)
	if m == nil {
		t.Fatalf("stdout says %q", line)
	}
	s.url = m[1]
	t.Cleanup(cancel)
	return s
}

func (s *server) stop(t *testing.T) {
	t.Helper()
	s.cancel()
	select {
	case err := <-s.ended:
		if err != nil {
			t.Errorf("run ended with: %v", err)
		}
	case <-time.After(10 * time.Second):
		t.Fatal("run does not end")
	}
	if rest := <-s.rest; rest != "" {
		t.Errorf("more on stdout: %q", rest)
	}
}

func get(t *testing.T, url, host string) (int, string) {
	t.Helper()
	req, err := http.NewRequestWithContext(t.Context(), "GET", url, nil)
	if err != nil {
		t.Fatal(err)
	}
	if host != "" {
		req.Host = host
	}
	res, err := http.DefaultClient.Do(req)
	if err != nil {
		t.Fatal(err)
	}
	defer res.Body.Close()
	b, err := io.ReadAll(res.Body)
	if err != nil {
		t.Fatal(err)
	}
	return res.StatusCode, string(b)
}

func TestStartAndStop(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "data")
	s := start(t, noEnv, "-listen", "127.0.0.1:0", "-data", dir, "-log", "debug")
	if code, body := get(t, s.url+"healthz", ""); code != 200 || body != "ok" {
		t.Errorf("healthz: %d %q", code, body)
	}
	if code, _ := get(t, s.url+"healthz", "elsewhere.example"); code != 421 {
		t.Errorf("other host: %d", code)
	}
	s.stop(t)
	if _, err := http.Get(s.url + "healthz"); err == nil {
		t.Error("still answers after the end")
	}
	if got := s.log.String(); strings.Count(got, "msg=request") != 2 || !strings.Contains(got, "path=/healthz status=200") {
		t.Errorf("log: %s", got)
	}
	db, err := store.Open(t.Context(), dir, "test")
	if err != nil {
		t.Fatalf("the database after the end: %v", err)
	}
	db.Close()
	if _, err := os.Stat(filepath.Join(dir, store.FileName+"-wal")); err == nil {
		t.Error("the database was not closed: its write-ahead log is there")
	}
}

func TestEnvironment(t *testing.T) {
	dir := t.TempDir()
	vars := env(map[string]string{"LEGWRIGHT_LISTEN": "127.0.0.1:0", "LEGWRIGHT_DATA": dir, "LEGWRIGHT_LOG": "info", "LEGWRIGHT_HOSTS": "workshop.example, bench.example:99"})
	s := start(t, vars)
	port := s.url[strings.LastIndex(s.url, ":")+1 : len(s.url)-1]
	for host, want := range map[string]int{"workshop.example:" + port: 200, "bench.example:99": 200, "workshop.example": 421, "localhost:" + port: 200} {
		if code, _ := get(t, s.url+"healthz", host); code != want {
			t.Errorf("host %s: %d, want %d", host, code, want)
		}
	}
	s.stop(t)
	if strings.Contains(s.log.String(), "msg=request") {
		t.Errorf("requests in the log at info: %s", s.log)
	}
	if _, err := os.Stat(filepath.Join(dir, store.FileName)); err != nil {
		t.Error(err)
	}
	// A flag goes before its variable.
	other := t.TempDir()
	start(t, vars, "-data", other).stop(t)
	if _, err := os.Stat(filepath.Join(other, store.FileName)); err != nil {
		t.Error(err)
	}
}

func TestAllowNetwork(t *testing.T) {
	for about, s := range map[string]*server{
		"flag":     start(t, noEnv, "-listen", "0.0.0.0:0", "-allow-network", "-data", t.TempDir()),
		"variable": start(t, env(map[string]string{"LEGWRIGHT_ALLOW_NETWORK": "1"}), "-listen", ":0", "-data", t.TempDir()),
	} {
		if !strings.HasPrefix(s.url, "http://127.0.0.1:") {
			t.Errorf("%s: %s", about, s.url)
		}
		if code, _ := get(t, s.url+"healthz", ""); code != 200 {
			t.Errorf("%s: %d", about, code)
		}
		s.stop(t)
		if !strings.Contains(s.log.String(), "level=WARN msg=\"open to the network") {
			t.Errorf("%s: no warning in %s", about, s.log)
		}
	}
}

// Each sentence must help the user on.
func TestRefused(t *testing.T) {
	taken, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	defer taken.Close()
	used := t.TempDir()
	db, err := store.Open(t.Context(), used, "test")
	if err != nil {
		t.Fatal(err)
	}
	defer db.Close()
	free := "127.0.0.1:0"
	for _, c := range []struct {
		about string
		env   map[string]string
		args  []string
		want  []string
	}{
		{"port taken", nil, []string{"-listen", taken.Addr().String()}, []string{taken.Addr().String() + " is taken by another program", "-listen 127.0.0.1:", "-listen 127.0.0.1:0"}},
		{"folder used", nil, []string{"-listen", taken.Addr().String(), "-data", used}, []string{"another Legwright is already using the data folder " + used}},
		{"all addresses", nil, []string{"-listen", "0.0.0.0:0"}, []string{"can be reached from other computers", "no password", "-allow-network"}},
		{"no host", nil, []string{"-listen", ":0"}, []string{"-allow-network"}},
		{"IPv6 all", nil, []string{"-listen", "[::]:0"}, []string{"-allow-network"}},
		{"other address", nil, []string{"-listen", "192.0.2.1:0"}, []string{"192.0.2.1:0 can be reached", "-allow-network"}},
		{"name", nil, []string{"-listen", "workshop.example:0"}, []string{"-allow-network"}},
		{"network in the environment", map[string]string{"LEGWRIGHT_LISTEN": "0.0.0.0:0"}, nil, []string{"-allow-network"}},
		{"network not allowed", map[string]string{"LEGWRIGHT_ALLOW_NETWORK": "0"}, []string{"-listen", "0.0.0.0:0"}, []string{"-allow-network"}},
		{"neither 1 nor 0", map[string]string{"LEGWRIGHT_ALLOW_NETWORK": "maybe"}, nil, []string{"LEGWRIGHT_ALLOW_NETWORK", `1 or 0, not "maybe"`}},
		{"flag off over variable on", map[string]string{"LEGWRIGHT_ALLOW_NETWORK": "1"}, []string{"-allow-network=false", "-listen", "0.0.0.0:0"}, []string{"can be reached"}},
		{"no port", nil, []string{"-listen", "127.0.0.1"}, []string{"an address and a port like 127.0.0.1:8080"}},
		{"port too large", nil, []string{"-listen", "127.0.0.1:99999"}, []string{"cannot listen on 127.0.0.1:99999"}},
		{"unknown flag", nil, []string{"-colour"}, []string{"-colour", "-help lists the flags"}},
		{"no such project file", nil, []string{"start"}, []string{"the project file cannot be read", "start"}},
		{"two project files", nil, []string{"a.json", "b.json"}, []string{`"b.json"`, "one project file"}},
		{"backup and file", nil, []string{"-backup", "x.db", "a.json"}, []string{"exclude one another"}},
		{"restore of nothing", nil, []string{"-restore", "missing.db"}, []string{"the backup cannot be read"}},
		{"log level", nil, []string{"-listen", free, "-log", "loud"}, []string{`info or debug, not "loud"`}},
		{"log level in the environment", map[string]string{"LEGWRIGHT_LOG": "loud"}, nil, []string{"LEGWRIGHT_LOG"}},
		{"any host", nil, []string{"-listen", free, "-hosts", "*"}, []string{"workshop.example", `not "*"`}},
	} {
		var stdout, stderr bytes.Buffer
		ctx, cancel := context.WithTimeout(t.Context(), 5*time.Second)
		err := run(ctx, append([]string{"-data", t.TempDir()}, c.args...), env(c.env), &stdout, &stderr)
		cancel()
		if err == nil {
			t.Errorf("%s: started", c.about)
			continue
		}
		for _, part := range c.want {
			if !strings.Contains(err.Error(), part) {
				t.Errorf("%s: %q lacks %q", c.about, err, part)
			}
		}
		if stdout.Len() > 0 {
			t.Errorf("%s: stdout %q", c.about, &stdout)
		}
	}
}

// A name that turns out to be a network address is refused as such.
func TestNameOfNetworkAddress(t *testing.T) {
	l, err := listen(t.Context(), options{listen: "0.0.0.0:0"})
	if err == nil {
		l.Close()
		t.Fatal("listens to the network")
	}
	if !strings.Contains(err.Error(), "-allow-network") {
		t.Error(err)
	}
}

func TestHelpAndVersion(t *testing.T) {
	for arg, want := range map[string][]string{
		"-help":    {"There is no password: anyone who can reach the port", "LEGWRIGHT_LISTEN", "LEGWRIGHT_ALLOW_NETWORK", "LEGWRIGHT_HOSTS", "LEGWRIGHT_DATA", "LEGWRIGHT_LOG", "127.0.0.1:8080"},
		"-version": {"Legwright " + version + "\n"},
	} {
		var stdout, stderr bytes.Buffer
		if err := run(t.Context(), []string{arg}, noEnv, &stdout, &stderr); err != nil {
			t.Errorf("%s: %v", arg, err)
		}
		for _, part := range want {
			if !strings.Contains(stdout.String(), part) {
				t.Errorf("%s says %q, without %q", arg, &stdout, part)
			}
		}
		if stderr.Len() > 0 {
			t.Errorf("%s: stderr %q", arg, &stderr)
		}
	}
}

func TestDefaults(t *testing.T) {
	home := t.TempDir()
	t.Setenv("XDG_CONFIG_HOME", home)
	t.Setenv("HOME", home)
	o, err := parseOptions(nil, noEnv, io.Discard)
	if err != nil {
		t.Fatal(err)
	}
	if o.listen != "127.0.0.1:8080" || o.allowNetwork || filepath.Base(o.data) != "legwright" || !strings.HasPrefix(o.data, home) {
		t.Errorf("%+v", o)
	}
}

func TestAllowedHosts(t *testing.T) {
	for _, c := range []struct {
		listen string
		hosts  []string
		port   int
		want   string
	}{
		{"127.0.0.1:8080", nil, 8080, "127.0.0.1:8080 localhost:8080 [::1]:8080"},
		{"127.0.0.5:0", nil, 99, "127.0.0.1:99 localhost:99 [::1]:99 127.0.0.5:99"},
		{"[2001:db8::1]:8080", nil, 8080, "127.0.0.1:8080 localhost:8080 [::1]:8080 [2001:db8::1]:8080"},
		{"0.0.0.0:8080", []string{"a.example", "b.example:1"}, 8080, "127.0.0.1:8080 localhost:8080 [::1]:8080 a.example:8080 b.example:1"},
		{"localhost:80", nil, 80, "127.0.0.1:80 127.0.0.1 localhost:80 localhost [::1]:80 [::1]"},
	} {
		o := options{listen: c.listen, hosts: c.hosts}
		var err error
		if o.host, o.port, err = net.SplitHostPort(c.listen); err != nil {
			t.Fatal(err)
		}
		if got := strings.Join(o.allowedHosts(c.port), " "); got != c.want {
			t.Errorf("%s %v: %s, want %s", c.listen, c.hosts, got, c.want)
		}
	}
}

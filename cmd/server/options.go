package main

import (
	"errors"
	"flag"
	"fmt"
	"io"
	"log/slog"
	"net"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
)

type options struct {
	listen       string
	host, port   string // the parts of listen
	allowNetwork bool
	hosts        []string
	data         string
	level        slog.Level
	version      bool
	backup       string // file to write a backup to, and end
	restore      string // backup to put in the place of the database, and end
	project      string // project file to open
}

// parseOptions reads the flags; where one is not given, its environment
// variable; where that is empty, the default. For -help it writes the help to
// out and returns flag.ErrHelp.
func parseOptions(args []string, getenv func(string) string, out io.Writer) (options, error) {
	var o options
	var hosts, level, network string
	f := flag.NewFlagSet("legwright", flag.ContinueOnError)
	f.SetOutput(io.Discard) // run's caller prints the error
	f.StringVar(&o.listen, "listen", "127.0.0.1:8080", "`address` to listen on; port 0 takes a free one (LEGWRIGHT_LISTEN)")
	f.BoolFunc("allow-network", "let -listen be an address that other computers reach. There is no password: anyone who can reach the port\n"+
		"can read and change all projects (LEGWRIGHT_ALLOW_NETWORK=1)", func(s string) error { network = s; return nil })
	f.StringVar(&hosts, "hosts", "", "comma-separated further `names` under which the pages are reached, as in workshop.example (LEGWRIGHT_HOSTS)")
	f.StringVar(&o.data, "data", "", "`folder` of the database (LEGWRIGHT_DATA; default legwright in the user's configuration folder)")
	f.StringVar(&level, "log", "info", "`level` of the log on standard error, info or debug (LEGWRIGHT_LOG)")
	f.BoolVar(&o.version, "version", false, "print the version and end")
	f.StringVar(&o.backup, "backup", "", "write a checked backup of the whole database to this new `file` and end")
	f.StringVar(&o.restore, "restore", "", "put the backup in this `file` in the place of the database, keep what was there, and end")
	f.VisitAll(func(fl *flag.Flag) {
		name := "LEGWRIGHT_" + strings.ToUpper(strings.ReplaceAll(fl.Name, "-", "_"))
		if v := getenv(name); v != "" && !slices.Contains([]string{"version", "backup", "restore"}, fl.Name) {
			fl.Value.Set(v) // texts only: parsed below, as those of flags are
		}
	})
	err := f.Parse(args)
	if errors.Is(err, flag.ErrHelp) {
		fmt.Fprintln(out, "Legwright checks a powerplant against a mission. It is used with a web browser on this computer.\n"+
			"After the flags the name of a project file may stand: it is taken into the database and opened.")
		f.SetOutput(out)
		f.PrintDefaults()
		return o, err
	}
	if err != nil {
		return o, fmt.Errorf("%w; -help lists the flags", err)
	}
	if f.NArg() > 1 {
		return o, fmt.Errorf("one project file can be opened, not also %q; flags stand before it; -help lists them", f.Arg(1))
	}
	o.project = f.Arg(0)
	if o.backup != "" && o.restore != "" || (o.backup != "" || o.restore != "") && o.project != "" {
		return o, errors.New("-backup, -restore and a project file exclude one another")
	}
	if o.version {
		return o, nil
	}
	return o, o.finish(network, hosts, level)
}

func (o *options) finish(network, hosts, level string) (err error) {
	if network != "" {
		if o.allowNetwork, err = strconv.ParseBool(network); err != nil {
			return fmt.Errorf("allow-network (LEGWRIGHT_ALLOW_NETWORK) is 1 or 0, not %q", network)
		}
	}
	switch level {
	case "info":
		o.level = slog.LevelInfo
	case "debug":
		o.level = slog.LevelDebug
	default:
		return fmt.Errorf("log (LEGWRIGHT_LOG) is info or debug, not %q", level)
	}
	for name := range strings.SplitSeq(hosts, ",") {
		if name = strings.TrimSpace(name); name == "" {
			continue
		}
		if strings.ContainsAny(name, "/*@ \t") {
			return fmt.Errorf("hosts (LEGWRIGHT_HOSTS) takes names like workshop.example or workshop.example:8080, not %q", name)
		}
		o.hosts = append(o.hosts, name)
	}
	if o.host, o.port, err = net.SplitHostPort(o.listen); err != nil {
		return fmt.Errorf("listen (LEGWRIGHT_LISTEN) is an address and a port like 127.0.0.1:8080, not %q", o.listen)
	}
	if ip := net.ParseIP(o.host); !o.allowNetwork && o.host != "localhost" && (ip == nil || !ip.IsLoopback()) {
		return networkError(o.listen)
	}
	if o.data == "" {
		dir, err := os.UserConfigDir()
		if err != nil {
			return fmt.Errorf("there is no place for the data (%w): give one with -data", err)
		}
		o.data = filepath.Join(dir, "legwright")
	}
	return nil
}

func networkError(listen string) error {
	return fmt.Errorf("%s can be reached from other computers, and anyone who can reach the port can read and change all projects, since there is no password: "+
		"listen on 127.0.0.1, or give -allow-network as well to accept this", listen)
}

// allowedHosts is what Host may be once port is known.
func (o *options) allowedHosts(port int) []string {
	names := []string{"127.0.0.1", "localhost", "[::1]"}
	if own := bracketed(o.host); !o.everywhere() && !slices.Contains(names, own) {
		names = append(names, own)
	}
	var hosts []string
	for _, name := range append(names, o.hosts...) {
		if _, _, err := net.SplitHostPort(name); err == nil {
			hosts = append(hosts, name)
			continue
		}
		hosts = append(hosts, fmt.Sprintf("%s:%d", name, port))
		if port == 80 { // browsers leave it out
			hosts = append(hosts, name)
		}
	}
	return hosts
}

// url is where this computer's browser finds the pages.
func (o *options) url(port int) string {
	host := o.host
	if o.everywhere() {
		host = "127.0.0.1"
	}
	return "http://" + net.JoinHostPort(host, strconv.Itoa(port)) + "/"
}

// everywhere is whether listen stands for all addresses of this computer.
func (o *options) everywhere() bool {
	ip := net.ParseIP(o.host)
	return o.host == "" || ip != nil && ip.IsUnspecified()
}

func (o *options) withPort(port string) string { return net.JoinHostPort(o.host, port) }

func (o *options) nextPort() string {
	n, err := strconv.Atoi(o.port)
	if err != nil || n >= 65535 {
		n = 8080
	}
	return strconv.Itoa(n + 1)
}

func bracketed(host string) string {
	if strings.Contains(host, ":") {
		return "[" + host + "]"
	}
	return host
}

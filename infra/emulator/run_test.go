//go:build deployment

package emulator

import (
	"bufio"
	"bytes"
	"fmt"
	"io"
	"net"
	"net/http"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"syscall"
	"testing"
	"time"
)

const root = "../.."

// built are the programs, by name.
var built = map[string]string{}

func TestMain(m *testing.M) {
	dir, err := os.MkdirTemp("", "emulator")
	if err == nil {
		err = build(dir)
	}
	status := 1
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
	} else {
		status = m.Run()
	}
	os.RemoveAll(dir)
	os.Exit(status)
}

func build(dir string) error {
	for name, command := range map[string][]string{
		"emulator": {"go", "build", "-modfile=infra/tools.mod", "-o", "OUT", "github.com/aws/aws-lambda-runtime-interface-emulator/cmd/aws-lambda-rie"},
		"check":    {"infra/build.sh", "--program", "./functions/check", "OUT"},
		"broken":   {"infra/build.sh", "--program", "./infra/emulator/broken", "OUT"},
		"empty":    {"infra/build.sh", "--program", "./infra/emulator/empty", "OUT"},
	} {
		built[name] = filepath.Join(dir, name)
		for i, word := range command {
			if word == "OUT" {
				command[i] = built[name]
			}
		}
		c := exec.Command(command[0], command[1:]...)
		c.Dir = root
		if out, err := c.CombinedOutput(); err != nil {
			return fmt.Errorf("%s: %w\n%s", strings.Join(command, " "), err, out)
		}
	}
	return nil
}

// A function is a program under an emulator of its own.
type function struct {
	t    testing.TB
	url  string
	pid  int // of the emulator
	stop func()
	mu   sync.Mutex
	logs bytes.Buffer // of the program and the emulator
}

// start runs a program until the test ends. The emulator starts the program with the first event.
func start(t testing.TB, program string, environment ...string) *function {
	t.Helper()
	front, runtime := freePort(t), freePort(t)
	c := exec.Command(built["emulator"], "--runtime-interface-emulator-address", front, "--runtime-api-address", runtime, built[program])
	c.Env = append(os.Environ(), environment...)
	c.SysProcAttr = &syscall.SysProcAttr{Setpgid: true}
	f := &function{t: t, url: "http://" + front + "/2015-03-31/functions/function/invocations"}
	c.Stdout, c.Stderr = f, f
	if err := c.Start(); err != nil {
		t.Fatal(err)
	}
	f.pid = c.Process.Pid
	f.stop = sync.OnceFunc(func() {
		syscall.Kill(-f.pid, syscall.SIGKILL)
		c.Wait()
	})
	t.Cleanup(func() {
		f.stop()
		if t.Failed() {
			t.Log(f.log())
		}
	})
	f.await(front)
	return f
}

// await waits until the emulator listens.
func (f *function) await(address string) {
	f.t.Helper()
	for range 200 {
		if c, err := net.Dial("tcp", address); err == nil {
			c.Close()
			return
		}
		time.Sleep(25 * time.Millisecond)
	}
	f.t.Fatalf("the emulator does not listen:\n%s", f.log())
}

// Write collects what program and emulator print.
func (f *function) Write(b []byte) (int, error) {
	f.mu.Lock()
	defer f.mu.Unlock()
	return f.logs.Write(b)
}

func (f *function) log() string {
	f.mu.Lock()
	defer f.mu.Unlock()
	return f.logs.String()
}

// invoke sends one event and gives what the function answers.
func (f *function) invoke(event []byte) []byte {
	f.t.Helper()
	r, err := http.Post(f.url, "application/json", bytes.NewReader(event))
	if err != nil {
		f.t.Fatal(err)
	}
	defer r.Body.Close()
	b, err := io.ReadAll(r.Body)
	if err != nil || r.StatusCode != http.StatusOK {
		f.t.Fatalf("status %d, %v: %.300s", r.StatusCode, err, b)
	}
	return b
}

// program is the process that the emulator runs: its number and its resident memory in KiB.
func (f *function) program() (pid string, resident int) {
	f.t.Helper()
	tasks, err := filepath.Glob(fmt.Sprintf("/proc/%d/task/*/children", f.pid))
	if err != nil {
		f.t.Fatal(err)
	}
	var children []string
	for _, task := range tasks {
		b, err := os.ReadFile(task)
		if err == nil { // a thread may have ended
			children = append(children, strings.Fields(string(b))...)
		}
	}
	if len(children) != 1 {
		f.t.Fatalf("the emulator runs %v; one program is wanted", children)
	}
	status, err := os.Open("/proc/" + children[0] + "/status")
	if err != nil {
		f.t.Fatal(err)
	}
	defer status.Close()
	for lines := bufio.NewScanner(status); lines.Scan(); {
		if fmt.Sscanf(lines.Text(), "VmRSS: %d kB", &resident); resident > 0 {
			break
		}
	}
	return children[0], resident
}

func freePort(t testing.TB) string {
	t.Helper()
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	defer l.Close()
	return l.Addr().String()
}

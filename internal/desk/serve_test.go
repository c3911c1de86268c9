package desk_test

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"net"
	"net/http"
	"os"
	"syscall"
	"testing"
	"time"

	"gramlaw/internal/desk"
)

// httpClient is the command of the scripts: http METHOD URL [FILE]. It waits for a server that is about to listen, and writes the body,
// and the status to standard error.
func httpClient() {
	if err := fetch(os.Args[1], os.Args[2], os.Args[3:]); err != nil {
		fmt.Fprintln(os.Stderr, err)
		os.Exit(1)
	}
}

func fetch(method, url string, file []string) error {
	var body []byte
	if len(file) > 0 {
		var err error
		if body, err = os.ReadFile(file[0]); err != nil {
			return err
		}
	}
	r, err := http.NewRequest(method, url, bytes.NewReader(body))
	if err != nil {
		return err
	}
	r.Header.Set("Content-Type", "application/json")
	w, err := once(r)
	if err != nil {
		return err
	}
	defer w.Body.Close()
	fmt.Fprintln(os.Stderr, w.Status)
	_, err = io.Copy(os.Stdout, w.Body)
	return err
}

// once tries again while nobody listens yet.
func once(r *http.Request) (*http.Response, error) {
	for range 600 {
		w, err := http.DefaultClient.Do(r)
		if !errors.Is(err, syscall.ECONNREFUSED) {
			return w, err
		}
		time.Sleep(50 * time.Millisecond)
	}
	return nil, errors.New("nobody listens")
}

// freeAddress is an address of this machine that nobody uses.
func freeAddress(t *testing.T) string {
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	defer l.Close()
	return l.Addr().String()
}

func TestServeNeedsAnAddress(t *testing.T) {
	taken, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	defer taken.Close()
	for _, address := range []string{taken.Addr().String(), "nowhere", "127.0.0.1:99999"} {
		if code, out, errs := run(t, testEnv(), "serve", "-listen", address); code != desk.BadCall || out != "" || errs == "" {
			t.Errorf("%s: status %d, output %q, message %q", address, code, out, errs)
		}
	}
}

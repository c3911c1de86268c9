//go:build deployment

package infra

import (
	"archive/zip"
	"bytes"
	"crypto/sha256"
	"debug/buildinfo"
	"debug/elf"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// The archive is the same from two folders, of which the second shares no cache with the first.
func TestSameBytes(t *testing.T) {
	first, second := t.TempDir(), t.TempDir()
	build(t, "..", first)
	clone := filepath.Join(t.TempDir(), "another", "place")
	for _, part := range []string{"functions", "internal", "rules", "schemas", "infra"} {
		if err := os.CopyFS(filepath.Join(clone, part), os.DirFS(filepath.Join("..", part))); err != nil {
			t.Fatal(err)
		}
	}
	for _, name := range []string{"go.mod", "go.sum"} {
		b, err := os.ReadFile(filepath.Join("..", name))
		if err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(filepath.Join(clone, name), b, 0o644); err != nil {
			t.Fatal(err)
		}
	}
	if err := os.Chmod(filepath.Join(clone, "infra", "build.sh"), 0o755); err != nil {
		t.Fatal(err)
	}
	build(t, clone, second, "GOCACHE="+t.TempDir())
	a, b := read(t, filepath.Join(first, "check.zip")), read(t, filepath.Join(second, "check.zip"))
	if !bytes.Equal(a, b) {
		t.Errorf("two builds differ: %x and %x", sha256.Sum256(a), sha256.Sum256(b))
	}
	t.Logf("%d bytes, sha256 %x", len(a), sha256.Sum256(a))
	program(t, a, clone)
}

func build(t *testing.T, dir, out string, environment ...string) {
	t.Helper()
	c := exec.Command("infra/build.sh", out)
	c.Dir, c.Env = dir, append(os.Environ(), environment...)
	if said, err := c.CombinedOutput(); err != nil {
		t.Fatalf("infra/build.sh in %s: %v\n%s", dir, err, said)
	}
}

func read(t *testing.T, name string) []byte {
	t.Helper()
	b, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// program checks what is in the archive: one executable, static, for arm64, that names no place of this machine.
func program(t *testing.T, archive []byte, dir string) {
	t.Helper()
	const most = 50 << 20 // Reference: Lambda quotas, "Deployment package (.zip file archive) size"
	if len(archive) > most {
		t.Errorf("the archive has %d bytes, Lambda takes %d", len(archive), most)
	}
	z, err := zip.NewReader(bytes.NewReader(archive), int64(len(archive)))
	if err != nil || len(z.File) != 1 || z.File[0].Name != "bootstrap" || z.File[0].Mode().Perm() != 0o755 {
		t.Fatalf("the archive is not one executable bootstrap: %v, %v", err, z.File)
	}
	f, err := z.File[0].Open()
	if err != nil {
		t.Fatal(err)
	}
	code, err := io.ReadAll(f)
	if err != nil {
		t.Fatal(err)
	}
	static(t, code)
	here, err := filepath.Abs("..")
	if err != nil {
		t.Fatal(err)
	}
	for _, place := range []string{here, dir, os.Getenv("HOME") + "/go/"} {
		if bytes.Contains(code, []byte(place)) {
			t.Errorf("the program names %s", place)
		}
	}
	info, err := buildinfo.Read(bytes.NewReader(code))
	if err != nil {
		t.Fatal(err)
	}
	for _, s := range info.Settings {
		if strings.HasPrefix(s.Key, "vcs") {
			t.Errorf("the program carries %s", s.Key)
		}
	}
	for _, want := range []string{"-tags=lambda.norpc", "-trimpath=true", "CGO_ENABLED=0", "GOARCH=arm64", "GOOS=linux"} {
		if !strings.Contains(info.String(), "build\t"+want+"\n") {
			t.Errorf("the program was not built with %s:\n%s", want, info)
		}
	}
}

func static(t *testing.T, code []byte) {
	t.Helper()
	e, err := elf.NewFile(bytes.NewReader(code))
	if err != nil {
		t.Fatal(err)
	}
	if got := fmt.Sprint(e.Machine, e.Class, e.Type); got != "EM_AARCH64 ELFCLASS64 ET_EXEC" {
		t.Errorf("the program is %s", got)
	}
	libraries, err := e.ImportedLibraries()
	if err != nil || len(libraries) > 0 {
		t.Errorf("the program needs %v, %v", libraries, err)
	}
	for _, p := range e.Progs {
		if p.Type == elf.PT_INTERP {
			t.Error("the program wants a dynamic linker")
		}
	}
}

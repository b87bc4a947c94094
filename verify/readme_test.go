package verify_test

import (
	"os"
	"strings"
	"testing"
)

// TestReadme demands that the first page of code in the README is the program examples/firstpage, to the letter.
func TestReadme(t *testing.T) {
	readme, err := os.ReadFile("../README.md")
	if err != nil {
		t.Fatal(err)
	}
	program, err := os.ReadFile("../examples/firstpage/main.go")
	if err != nil {
		t.Fatal(err)
	}
	_, code, ok := strings.Cut(string(program), "package main")
	if !ok || !strings.Contains(string(readme), "```go\npackage main"+strings.TrimRight(code, "\n")+"\n```") {
		t.Error("README.md does not hold the code of examples/firstpage/main.go; copy it from package main on")
	}
	for _, command := range []string{"go run ./examples/scene", "go test ./..."} {
		if !strings.Contains(string(readme), command) {
			t.Errorf("README.md lacks the command %q", command)
		}
	}
}

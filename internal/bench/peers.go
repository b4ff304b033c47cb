package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"time"
)

// A result is one timing of one case: nanoseconds a step, and the outputs at some
// steps to hold against the reference.
type result struct {
	Peer, Case string
	Ns         float64
	Check      map[string][8]float64
}

// A peer is a program that prints a result a line.
type peer struct {
	dir  string
	args []string
}

func (p peer) run() ([]result, error) {
	cmd := exec.Command(p.args[0], p.args[1:]...)
	cmd.Dir, cmd.Stderr = p.dir, os.Stderr
	out, err := cmd.Output()
	if err != nil {
		return nil, fmt.Errorf("%s: %w", strings.Join(p.args, " "), err)
	}
	var all []result
	for dec := json.NewDecoder(bytes.NewReader(out)); dec.More(); {
		var r result
		if err := dec.Decode(&r); err != nil {
			return nil, fmt.Errorf("%s: %w", p.args[0], err)
		}
		all = append(all, r)
	}
	return all, nil
}

// buildPeers compiles what can be compiled here in a folder that done removes.
func buildPeers(set *cases, general bool, slice time.Duration) (peers []peer, done func(), err error) {
	cc := compiler()
	if cc == "" {
		fmt.Println("no C compiler found (cc, gcc, clang): the library runs alone, without ratios")
		return nil, func() {}, nil
	}
	dir, err := os.MkdirTemp("", "twopoint-bench-")
	if err != nil {
		return nil, nil, err
	}
	done = func() { os.RemoveAll(dir) }
	defer func() {
		if err != nil {
			done()
		}
	}()
	sub, err := fs.Sub(files, "peers")
	if err != nil {
		return nil, nil, err
	}
	if err := os.CopyFS(dir, sub); err != nil {
		return nil, nil, err
	}
	if err := set.writeFlat(dir); err != nil {
		return nil, nil, err
	}
	for _, name := range []string{"closed", "lever"} {
		if err := compile(cc, dir, name, slice, "-lm"); err != nil {
			return nil, nil, err
		}
		peers = append(peers, peer{dir, []string{"./" + name}})
	}
	if general {
		peers = append(peers, buildGeneral(cc, dir, slice)...)
	}
	return peers, done, nil
}

// buildGeneral compiles the general solver, or says why it can't.
func buildGeneral(cc, dir string, slice time.Duration) []peer {
	err := compile(cc, dir, "kin", slice, "-I/usr/include/suitesparse", "-lsundials_kinsol", "-lsundials_sunlinsolklu",
		"-lsundials_sunlinsolband", "-lsundials_sunlinsoldense", "-lsundials_sunmatrixsparse", "-lsundials_nvecserial", "-lklu", "-lm")
	if err != nil {
		fmt.Println("the general solver is left out (it needs the development files of SUNDIALS and SuiteSparse):", err)
		return nil
	}
	var peers []peer
	for _, c := range []string{"sixbar_watt", "sixbar_steph", "chain10"} {
		peers = append(peers, peer{dir, []string{"./kin", "kinsol", "dense", "body", c}})
	}
	return peers
}

func compiler() string {
	for _, cc := range []string{"gcc", "cc", "clang"} {
		if path, err := exec.LookPath(cc); err == nil {
			return path
		}
	}
	return ""
}

// compile builds one peer. -march=native is the best case of C; where a compiler
// does not know it, it goes without.
func compile(cc, dir, name string, slice time.Duration, libs ...string) error {
	var err error
	for _, native := range []string{"-march=native", "-O3"} {
		args := append([]string{"-O3", native, "-D_GNU_SOURCE", "-DSLICE=" + strconv.FormatFloat(slice.Seconds(), 'g', -1, 64), "-o", filepath.Join(dir, name), filepath.Join(dir, name+".c")}, libs...)
		var out []byte
		if out, err = exec.Command(cc, args...).CombinedOutput(); err == nil {
			return nil
		}
		err = fmt.Errorf("%s: %w\n%s", name, err, out)
	}
	return err
}

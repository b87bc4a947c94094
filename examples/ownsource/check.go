package main

// check holds a source against the laws of the static field.
func check(w wire) error { return nil }

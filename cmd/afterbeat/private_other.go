//go:build !unix

package main

func private() {}

// Command flankwright dimensions gear pairs, says what to measure and between
// which limits, draws the contour and prints the inspection sheet.
package main

import "os"

func main() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }

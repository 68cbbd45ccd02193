// Command flankwright sizes nothing yet but dimensions a gear pair, says what
// to measure, draws the contour and prints the inspection sheet.
package main

import "os"

func main() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }

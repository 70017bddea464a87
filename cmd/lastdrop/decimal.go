package main

import (
	"github.com/urfave/cli/v2"

	"lastdrop/report"
)

// decimalOption lets people choose the mark in the figures of what they read.
func decimalOption(where string) option {
	return option{flag: &cli.StringFlag{Name: "decimal", Value: "point"}, value: "MARK",
		says: "mark in the figures of " + where + ": point or comma; workbooks follow the reader's own setting, records always have the point", without: "point"}
}

// decimalOf reads the option.
func decimalOf(c *cli.Context) (report.Decimal, error) {
	switch c.String("decimal") {
	case "point":
		return report.DecimalPoint, nil
	case "comma":
		return report.DecimalComma, nil
	}
	return report.DecimalPoint, usage("lastdrop "+c.Command.Name+" --help", "--decimal %q is not known; it is one of point, comma", c.String("decimal"))
}

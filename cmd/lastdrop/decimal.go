package main

import (
	"github.com/urfave/cli/v2"

	"lastdrop/report"
)

// decimals are the values of --decimal.
var decimals = map[string]report.Decimal{"point": report.DecimalPoint, "comma": report.DecimalComma}

// decimalOption lets people choose the mark in the figures of what they read.
func decimalOption(where string) option {
	return option{flag: &cli.StringFlag{Name: "decimal", Value: "point"}, value: "MARK",
		says: "mark in the figures of " + where + ": point or comma; workbooks follow the reader's own setting, records always have the point", without: "point"}
}

func checkDecimal(c *cli.Context) error {
	if _, known := decimals[c.String("decimal")]; !known {
		return usage("lastdrop "+c.Command.Name+" --help", "--decimal %q is not known; it is one of point, comma", c.String("decimal"))
	}
	return nil
}

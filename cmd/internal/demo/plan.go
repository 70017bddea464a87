package demo

// job is one titration of the night as planned.
type job struct {
	procedure *procedure
	fault     Fault
	dialect   string // of a dump of Bench A: plain or bench-a
	toSet     bool   // titrated to the procedure's set reading
	endsAtSet bool   // and dosing ends there
}

// planBenchA returns the runs of Bench A, one a dump, from 0417.csv on.
func planBenchA() []job {
	hcl, vin, pho, amm := hydrochloric(), vinegar(), phosphoric(), ammonia()
	plain := func(p *procedure, f Fault) job { return job{procedure: p, fault: f, dialect: "plain"} }
	own := func(p *procedure, f Fault) job { return job{procedure: p, fault: f, dialect: "bench-a"} }
	set := func(f Fault, endsThere bool) job {
		return job{procedure: vin, fault: f, dialect: "bench-a", toSet: true, endsAtSet: endsThere}
	}
	return []job{
		plain(hcl, Clean), plain(hcl, Clean), own(vin, Clean), own(vin, ExportedTwice), // 0417 to 0420
		set(Clean, false), own(pho, Clean), own(vin, LargeOvershoot), plain(hcl, Sparse), // 0421 to 0424
		plain(amm, Clean), own(vin, Clean), own(vin, ExportedAgain), own(pho, StuckReading), // 0425 to 0428
		plain(hcl, Overshoot), set(Clean, true), own(pho, Clean), own(vin, SameReadings), // 0429 to 0432
		own(vin, SameReadings), plain(amm, VolumeReversal), plain(hcl, StopsShort), own(vin, WrongIndicated), // 0433 to 0436
		set(WrongIndicated, false), own(pho, Truncated), plain(hcl, NoSample), own(vin, Lagging), // 0437 to 0440
		own(vin, StrayReading), set(Clean, false), plain(hcl, ExportedTwice), own(pho, Clean), // 0441 to 0444
		own(vin, SwappedMarks), own(amm, Clean), own(pho, SwappedMark), plain(hcl, Clean), // 0445 to 0448
		set(Clean, true), own(vin, Clean), // 0449, 0450
	}
}

// planBenchB returns the dumps of Bench B, several runs each.
func planBenchB() [][]job {
	bri, wat, amm := brine(), alkalinity(), ammonia()
	runs := func(p *procedure, faults ...Fault) []job {
		var jobs []job
		for _, f := range faults {
			jobs = append(jobs, job{procedure: p, fault: f})
		}
		return jobs
	}
	return [][]job{
		runs(bri, Clean, Clean, Clean),
		runs(wat, Clean, Clean),
		runs(bri, Clean, Overshoot, Clean),
		runs(amm, Clean, Clean),
		runs(wat, Clean, StrayReading, Clean),
		runs(bri, Clean, WrongIndicated),
		runs(bri, Clean, Lagging, Clean),
		runs(wat, Clean, Clean),
		runs(bri, Clean, StopsShort),
		runs(amm, Clean, Sparse),
		runs(bri, StrayReading, Clean, StuckReading),
		append(runs(wat, Clean), runs(bri, Clean, CutOff)...),
	}
}

// planBenchC returns the dumps of Bench C, several runs each.
func planBenchC() [][]job {
	cau, vco := caustic(), vinegarConductivity()
	runs := func(p *procedure, faults ...Fault) []job {
		var jobs []job
		for _, f := range faults {
			jobs = append(jobs, job{procedure: p, fault: f})
		}
		return jobs
	}
	return [][]job{
		runs(cau, Clean, Clean, Clean),
		runs(vco, Clean, Clean),
		runs(cau, Clean, WrongIndicated),
		runs(vco, Clean, Clean, Clean),
		runs(cau, Clean, StrayReading),
		runs(vco, Clean, WrongIndicated),
		runs(cau, Clean, NoSample),
		runs(vco, Clean, Clean),
		runs(cau, Clean, Clean),
		append(runs(vco, StrayReading), runs(cau, Clean)...),
	}
}

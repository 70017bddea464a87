package simulate

import "fmt"

// waterPKw are the values of pKw at 0, 5 ... 100 °C, molal scale, saturation
// pressure. Source: [mf], as in the CRC Handbook.
var waterPKw = [...]float64{
	14.938, 14.727, 14.528, 14.340, 14.163, 13.995, 13.836, 13.685, 13.542, 13.405, 13.275,
	13.152, 13.034, 12.921, 12.814, 12.712, 12.613, 12.520, 12.428, 12.345, 12.265,
}

// waterStepC is the step of the table in °C.
const waterStepC = 5

// PKw returns the negative decadic logarithm of the ion product of water at a
// temperature of 0 to 100 °C: the cubic through the four nearest values of
// the table of [mf], and the table itself where it has a value.
func PKw(temperatureC float64) (float64, error) {
	if !(temperatureC >= 0 && temperatureC <= 100) {
		return 0, fmt.Errorf("the temperature is %g °C; pKw is tabulated from 0 to 100 °C", temperatureC)
	}
	x := temperatureC / waterStepC
	first := min(max(int(x)-1, 0), len(waterPKw)-4)
	sum := 0.0
	for i := first; i < first+4; i++ {
		w := waterPKw[i]
		for j := first; j < first+4; j++ {
			if j != i {
				w *= (x - float64(j)) / float64(i-j)
			}
		}
		sum += w
	}
	return sum, nil
}

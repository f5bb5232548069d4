package problems

// The chemical problems: stiff by the spread of reaction rates.

// Robertson is the autocatalytic reaction of Robertson (1966), to the long times of Hairer's set.
func Robertson() *Case {
	rates, slopes := massAction([]reaction{
		{0.04, []int{1}, []term{{1, -1}, {2, 1}}},
		{1e4, []int{2, 3}, []term{{1, 1}, {2, -1}}},
		{3e7, []int{2, 2}, []term{{2, -1}, {3, 1}}},
	}, nil)
	return &Case{
		Name: "Robertson", Steps: 160, Source: "Hairer and Wanner's stiff test set; end value also in the Bari set",
		Start: []float64{1, 0, 0}, Rates: rates, Slopes: slopes, Floor: []float64{1e-8, 1e-14, 1e-8},
		Sums: [][]float64{{1, 1, 1}},
		Answers: []Answer{
			{T: 1.0, Y: []float64{0.9664597373330035, 3.074626578578675e-05, 0.03350951640121071}, Digits: 13},
			{T: 10.0, Y: []float64{0.8413699238414729, 1.623390937990473e-05, 0.1586138422491472}, Digits: 13},
			{T: 100.0, Y: []float64{0.6172348823960878, 6.153591274639123e-06, 0.3827589640126376}, Digits: 13},
			{T: 1000.0, Y: []float64{0.3368745306607069, 2.013702318261393e-06, 0.6631234556369748}, Digits: 13},
			{T: 10000.0, Y: []float64{0.107300428537804, 4.80016697257166e-07, 0.8926990914454987}, Digits: 13},
			{T: 100000.0, Y: []float64{0.01786592114209946, 7.274751468436319e-08, 0.9821340061103859}, Digits: 13},
			{T: 1000000.0, Y: []float64{0.002031483924973415, 8.142277783356159e-09, 0.9979685079327488}, Digits: 13},
			{T: 10000000.0, Y: []float64{0.0002076093439016395, 8.30607748506761e-10, 0.9997923898254906}, Digits: 13},
			{T: 100000000.0, Y: []float64{2.08241751217946e-05, 8.329841429908955e-11, 0.9999791757415798}, Digits: 13},
			{T: 1000000000.0, Y: []float64{2.083229471647004e-06, 8.332935037760724e-12, 0.9999979167621954}, Digits: 13},
			{T: 10000000000.0, Y: []float64{2.083328471883087e-07, 8.333315602809495e-13, 0.9999997916663195}, Digits: 13},
			{T: 100000000000.0, Y: []float64{2.083340149701284e-08, 8.333360770334743e-14, 0.9999999791665152}, Digits: 13},
		},
	}
}

// Hires is the high irradiance response of plants (Schäfer 1975).
func Hires() *Case {
	rates, slopes := massAction([]reaction{
		{1.71, []int{1}, []term{{1, -1}, {2, 1}}},
		{0.43, []int{2}, []term{{1, 1}, {2, -1}}},
		{8.32, []int{3}, []term{{1, 1}, {3, -1}}},
		{8.32, []int{2}, []term{{2, -1}, {4, 1}}},
		{1.71, []int{3}, []term{{3, -1}, {4, 1}}},
		{0.43, []int{4}, []term{{3, 1}, {4, -1}}},
		{0.69, []int{4}, []term{{4, -1}, {6, 1}}},
		{0.035, []int{5}, []term{{3, 1}, {5, -1}}},
		{1.71, []int{5}, []term{{5, -1}, {6, 1}}},
		{0.43, []int{6}, []term{{5, 1}, {6, -1}}},
		{280, []int{6, 8}, []term{{6, -1}, {7, 1}, {8, -1}}},
		{0.69, []int{7}, []term{{6, 1}, {7, -1}, {8, 1}}},
		{0.43, []int{7}, []term{{5, 1}, {7, -1}, {8, 1}}},
		{0.69, []int{7}, []term{{7, -1}, {8, 1}}},
	}, []float64{0.0007})
	return &Case{
		Name: "HIRES", Steps: 117, Source: "Bari test set (321.8122); Hairer and Wanner's stiff test set (421.8122)",
		Start: []float64{1, 0, 0, 0, 0, 0, 0, 0.0057}, Rates: rates, Slopes: slopes, Floor: []float64{1e-6},
		Sums: [][]float64{{0, 0, 0, 0, 0, 0, 1, 1}},
		Answers: []Answer{
			{T: 321.8122, Y: []float64{0.0007371312573325668, 0.0001442485726316185, 5.888729740967575e-05, 0.001175651343283149, 0.002386356198831331, 0.006238968252742796, 0.002849998395185769, 0.002850001604814231}, Digits: 13},
			{T: 421.8122, Y: []float64{0.000670305503581864, 0.000130996846986347, 4.6862231597733e-05, 0.001044668020551705, 0.000594883830951485, 0.001399628833942774, 0.00101449275771848, 0.00468550724228152}, Digits: 13},
		},
	}
}

// Oregonator is the Belousov-Zhabotinskii reaction after Field and Noyes.
func Oregonator() *Case {
	const s, q, w = 77.27, 8.375e-6, 0.161
	return &Case{
		Name: "Oregonator", Steps: 448, Source: "Hairer and Wanner's stiff test set; 360 also in the Bari set",
		Start: []float64{1, 2, 3}, Floor: []float64{1e-4},
		Rates: func(f []float64, _ float64, y []float64) {
			f[0] = s * (y[1] + y[0]*(1-q*y[0]-y[1]))
			f[1] = (y[2] - (1+y[0])*y[1]) / s
			f[2] = w * (y[0] - y[2])
		},
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
			add(0, 0, s*(1-2*q*y[0]-y[1]))
			add(0, 1, s*(1-y[0]))
			add(1, 0, -y[1]/s)
			add(1, 1, -(1+y[0])/s)
			add(1, 2, 1/s)
			add(2, 0, w)
			add(2, 2, -w)
		},
		Answers: []Answer{
			{T: 30.0, Y: []float64{1.000661467180497, 1512.778937348249, 10358.54312767229}, Digits: 13},
			{T: 60.0, Y: []float64{1.000874625199626, 1144.336972384497, 83.72149966624639}, Digits: 13},
			{T: 90.0, Y: []float64{1.001890368438751, 529.9926232295553, 1.66227957904242}, Digits: 13},
			{T: 120.0, Y: []float64{1.004118022612645, 243.8326079910346, 1.008822224048647}, Digits: 13},
			{T: 150.0, Y: []float64{1.008995416634061, 112.1664388662539, 1.007783229065319}, Digits: 13},
			{T: 180.0, Y: []float64{1.019763472537298, 51.59761322947535, 1.016985778956374}, Digits: 13},
			{T: 210.0, Y: []float64{1.043985088527474, 23.73442027531524, 1.037691843544522}, Digits: 13},
			{T: 240.0, Y: []float64{1.100849071667922, 10.9153380546902, 1.08583196981086}, Digits: 13},
			{T: 270.0, Y: []float64{1.249102130020572, 5.013945178605446, 1.208326626237875}, Digits: 13},
			{T: 300.0, Y: []float64{1.779724751937019, 2.281852385542403, 1.613754023671725}, Digits: 13},
			{T: 330.0, Y: []float64{1.000889326903503, 1125.438585746596, 16410.49483777168}, Digits: 13},
			{T: 360.0, Y: []float64{1.000814870318523, 1228.178521549889, 132.0554942846513}, Digits: 13},
		},
	}
}

// E5 is the pyrolysis model of Enright, Hull and Lindberg (1975) in its species 1, 3 and 4: the second is
// the sum y3 + y4 at all times, and integrated for itself it drowns the later ones in its round-off. The
// published values at 1e11 and 1e13 contradict the exact law of the late decay and are left out.
func E5() *Case {
	const a, b, c, m = 7.89e-10, 1.1e7, 1.13e3, 1e6
	return &Case{
		Name: "E5", Steps: 87, Source: "Hairer and Wanner's stiff test set",
		Start: []float64{1.76e-3, 0, 0}, Floor: []float64{1e-12, 1e-19, 1e-19},
		Rates: func(f []float64, _ float64, y []float64) {
			r1, r2, r3, r4 := a*y[0], b*y[0]*y[1], m*c*(y[1]+y[2])*y[1], c*y[2]
			f[0], f[1], f[2] = -r1-r2, r1-r2-r3+r4, r2-r4
		},
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
			add(0, 0, -a-b*y[1])
			add(0, 1, -b*y[0])
			add(1, 0, a-b*y[1])
			add(1, 1, -b*y[0]-m*c*(2*y[1]+y[2]))
			add(1, 2, c-m*c*y[1])
			add(2, 0, b*y[1])
			add(2, 1, b*y[0])
			add(2, 2, -c)
		},
		Answers: []Answer{
			{T: 10.0, Y: []float64{0.0017599259497677897, 7.637003853007391e-13, 1.3082581134075777e-11}, Digits: 13},
			{T: 1000.0, Y: []float64{0.0016180769999072943, 8.251573500683834e-12, 1.2997212954915352e-10}, Digits: 13},
			{T: 100000.0, Y: []float64{7.481320822429222e-06, 2.2123586689581663e-12, 1.6111948716243113e-13}, Digits: 13},
			{T: 10000000.0, Y: []float64{4.715033363040164e-10, 1.8188812376786725e-14, 8.34840202963217e-20}, Digits: 13},
		},
	}
}

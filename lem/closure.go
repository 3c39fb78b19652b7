package lem

// closing holds what force and moment closure leave over at the exit, and their derivatives by F and lambda.
type closing struct {
	e, eF, eL float64 // Horizontal force, kN.
	m, mF, mL float64 // Moment, kNm.
	least     float64 // The least 1 + g lambda f of all slices: the equations jump where one vanishes.
}

// closure runs through the slices from the head to the exit with the equations of Morgenstern and Price (1965) in the discrete form of
// slices. E and X = lambda f E are the horizontal and vertical forces between slices, the uphill part pulling the downhill part down, T is
// the horizontal and Q the vertical load of a slice. With C = c l - u l tan phi, m = cos + sin tan phi/F, g = (sin - cos tan phi/F)/m
// = tan(alpha - phi_m), horizontal and vertical equilibrium give
//
//	E_r (1 + g lambda f_r) = E_l (1 + g lambda f_l) + T + g Q - C/(F m),
//
// moments about the middle of the base, where the normal force acts, give, with M = E times the level of thrust,
//
//	M_r = M_l + (E_r - E_l) y - (X_l + X_r) b/2 + moment of the horizontal loads.
//
// E and M vanish at the head; at the exit they must. Written with F m = F cos + sin tan phi, so that a slice costs two divisions.
func (ws *Workspace) closure(f, lambda float64, leftward bool) closing {
	ss := ws.slice[:ws.n]
	side := ws.side[:len(ss)+1]
	k, next := 0, 1
	if leftward {
		k, next = len(ss)-1, -1
	}
	datum := ss[0].y
	c := closing{least: 1, m: ws.loadMoment}
	var x, xF, xL float64 // f E at the uphill side of the slice, with derivatives.
	fl := side[0]
	for _, fr := range side[1:] {
		s := &ss[k]
		k += next
		inv := 1 / (f*s.cos + s.sin*s.tan)
		g := (f*s.sin - s.cos*s.tan) * inv
		gF := (s.sin - g*s.cos) * inv
		r := (s.cl - s.ul*s.tan) * inv
		gl := g * lambda
		right := 1 + gl*fr
		if right < c.least {
			c.least = right
		}
		a := 1 / right
		left := 1 + gl*fl
		e := (c.e*left + s.h + s.k + g*s.q - r) * a
		xr := fr * e
		pull := x - xr
		eF := (c.eF*left + lambda*gF*pull + s.q*gF + r*s.cos*inv) * a
		eL := (c.eL*left + g*pull) * a
		xrF, xrL := fr*eF, fr*eL
		y, half := s.y-datum, s.b/2
		c.m += (e-c.e)*y - lambda*(x+xr)*half
		c.mF += (eF-c.eF)*y - lambda*(xF+xrF)*half
		c.mL += (eL-c.eL)*y - (x+xr+lambda*(xL+xrL))*half
		c.e, c.eF, c.eL = e, eF, eL
		x, xF, xL = xr, xrF, xrL
		fl = fr
	}
	return c
}

// prepareClosure works out what the closure needs whatever F and lambda are: the side-force function between slices, its greatest absolute
// value, and the moment of the horizontal loads about the middles of the bases.
func (ws *Workspace) prepareClosure(shape *SideForce, leftward bool) {
	ss := ws.slice[:ws.n]
	if len(ws.side) <= len(ss) {
		ws.side = make([]float64, 2*len(ss)+1)
	}
	side := ws.side[:len(ss)+1]
	ws.loadMoment = 0
	var length float64
	for i := range ss {
		s := &ss[i]
		length += s.b
		if s.h != 0 || s.k != 0 {
			ws.loadMoment += s.h*(s.hy-s.y) + s.k*(s.ky-s.y)
		}
	}
	if shape.Shape == Constant {
		for i := range side {
			side[i] = 1
		}
		ws.sidePeak = 1
		return
	}
	ws.sidePeak = 0
	var run float64
	for j := range side {
		side[j] = shape.At(run / length)
		ws.sidePeak = max(ws.sidePeak, side[j], -side[j])
		if j < len(ss) {
			run += ss[ws.fromHead(j, leftward)].b
		}
	}
}

// fromHead returns the index of the slice that is the j-th from the head.
func (ws *Workspace) fromHead(j int, leftward bool) int {
	if leftward {
		return ws.n - 1 - j
	}
	return j
}

package validation

// The sources.
var (
	algebra  = &Work{Name: "closed form", Title: "elementary statics or geometry, worked out from the formula beside the check"}
	arai     = &Work{"Arai and Tagyo (1985)", "Determination of noncircular slip surface giving the minimum factor of safety in slope stability analysis, Soils and Foundations 25(1), 43-51", true}
	asawa    = &Work{"Asawa", "Irrigation and Water Resources Engineering, Example 15.2, data as printed; the parabola is that of Casagrande (1937)", false}
	bishopM  = &Work{"Bishop and Morgenstern (1960)", "Stability coefficients for earth slopes, Geotechnique 10(4), 129-153", true}
	coulomb  = &Work{"Coulomb (1776)", "Essai sur une application des regles de maximis et minimis, active thrust on a rough wall", true}
	craig    = &Work{"Craig", "Soil Mechanics, 5th to 7th ed., chapter 9", true}
	culmann  = &Work{"Culmann (1866)", "Die graphische Statik, plane slips in a cohesive bank", true}
	das      = &Work{"Das and Sobhan", "Principles of Geotechnical Engineering, 9th ed., Problem 15.3, data as printed", false}
	dupuit   = &Work{"Dupuit (1863)", "Etudes theoriques et pratiques sur le mouvement des eaux", true}
	euro     = &Work{"EN 1997-1 (2004)", "Eurocode 7, Annex A, partial factors of design approach 1, combination 2", false}
	fredlund = &Work{"Fredlund and Krahn (1977)", "Comparison of slope stability methods of analysis, Can. Geotech. J. 14(3), 429-439", true}
	giam     = &Work{"Giam and Donald (1989)", "Example problems for testing soil slope stability programs, Civil Engineering Research Report 8/1989, Monash University", true}
	griff    = &Work{"Griffiths and Lane (1999)", "Slope stability analysis by finite elements, Geotechnique 49(3), 387-403", true}
	haefeli  = &Work{"Haefeli (1948)", "The stability of slopes acted upon by parallel seepage, Proc. 2nd ICSMFE 1, 57-62", true}
	hoek     = &Work{"Hoek", "Practical Rock Engineering, the Sau Mau Ping slope in Hong Kong", true}
	hutch    = &Work{"Hutchinson (1977)", "Assessment of the effectiveness of corrective measures in relation to geological conditions and types of slope movement, Bull. IAEG 16, 131-155", true}
	morg     = &Work{"Morgenstern (1963)", "Stability charts for earth slopes during rapid drawdown, Geotechnique 13(2), 121-131", true}
	okabe    = &Work{"Okabe (1926); Mononobe and Matsuo (1929)", "active thrust in an earthquake", true}
	rankine  = &Work{"Rankine (1857)", "On the stability of loose earth, Phil. Trans. R. Soc. 147", true}
	ritzema  = &Work{"Ritzema (1994)", "Drainage Principles and Applications, ILRI Publication 16, chapter 8", true}
	seed     = &Work{"Seed and Goodman (1964)", "Earthquake stability of slopes of cohesionless soils, J. Soil Mech. Found. Div. ASCE 90(SM6)", true}
	skempton = &Work{"Skempton and DeLory (1957)", "Stability of natural slopes in London Clay, Proc. 4th ICSMFE 2, 378-381", true}
	smith    = &Work{"Smith (2006)", "Smith's Elements of Soil Mechanics, 8th ed., chapter 5, with the author's worksheets", false}
	taylor   = &Work{"Taylor (1937)", "Stability of earth slopes, J. Boston Soc. Civ. Engrs 24(3), 197-246", true}
	terzaghi = &Work{"Terzaghi (1943)", "Theoretical Soil Mechanics, article 57: vertical banks with tension cracks", true}
	wilson   = &Work{"Wilson (1941); Fellenius (1927)", "circular arcs under a strip load on undrained ground", true}
	yamagami = &Work{"Yamagami and Ueta (1988); Greco (1996)", "6th ICONMIG, Innsbruck, 1335-1340; Efficient Monte Carlo technique for locating critical slip surface, J. Geotech. Engng 122(7), 517-525", true}
)

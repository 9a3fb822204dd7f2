package formula

// A Source is a published work.
type Source struct{ Key, Citation string }

// The bibliography. Bibliographic facts are from memory where no address was looked up.
var (
	Definition    = Source{"definition", "True by definition"}
	OwnDerivation = Source{"own", "Own derivation from the relations cited beside it"}

	StandardAtmosphere = Source{"USSA 1976", "NOAA, NASA and USAF, U.S. Standard Atmosphere, 1976; identical to ICAO Doc 7488 (1993) up to 32 km"}
	WMO                = Source{"WMO-No. 8", "World Meteorological Organization, Guide to Instruments and Methods of Observation, WMO-No. 8, annex 4.B"}
	Liepmann           = Source{"Liepmann & Roshko 1957", "H. W. Liepmann and A. Roshko, Elements of Gasdynamics, Wiley, 1957"}
	Anderson           = Source{"Anderson 1999", "J. D. Anderson, Aircraft Performance and Design, McGraw-Hill, 1999"}
	AndersonIntro      = Source{"Anderson 2005", "J. D. Anderson, Introduction to Flight, 5th edition, McGraw-Hill, 2005"}
	Raymer             = Source{"Raymer 1992", "D. P. Raymer, Aircraft Design: A Conceptual Approach, 2nd edition, AIAA, 1992"}
	Hoerner            = Source{"Hoerner 1965", "S. F. Hoerner, Fluid-Dynamic Drag, published by the author, 1965"}
	Schlichting        = Source{"Schlichting 1979", "H. Schlichting, Boundary-Layer Theory, 7th edition, McGraw-Hill, 1979"}
	GaggFerrar         = Source{"Gagg & Ferrar 1934", "R. F. Gagg and E. V. Ferrar, Altitude Performance of Aircraft Engines Equipped with Gear-Driven Superchargers, SAE Transactions 29, 1934, p. 217"}
	BrooksGarlock      = Source{"NACA TR 426", "D. B. Brooks and E. A. Garlock, The Effect of Humidity on Engine Power at Altitude, NACA TR 426, 1932"}
	Glauert            = Source{"Glauert 1935", "H. Glauert, Airplane Propellers, in W. F. Durand (ed.), Aerodynamic Theory, vol. IV, division L, Springer, 1935"}
	Carson             = Source{"Carson 1982", "B. H. Carson, Fuel Efficiency of Small Aircraft, Journal of Aircraft 19(6), 1982, p. 473"}
	Breguet            = Source{"Breguet", "L. Breguet, Calcul du poids de combustible consommé par un avion en vol ascendant, Comptes rendus de l'Académie des sciences 177, 1923"}
	FAR23              = Source{"14 CFR 23 (1996)", "Code of Federal Regulations, title 14, part 23, sections 23.333 to 23.341 and 23.1505 as amended to Amendment 23-48, 1996, before the rewriting of 2017; text from memory"}
	CSVLA              = Source{"CS-VLA", "European Aviation Safety Agency, Certification Specifications for Very Light Aeroplanes, CS-VLA, Amendment 1, 2009; text from memory"}
	Helmbold           = Source{"Helmbold 1942", "H. B. Helmbold, Der unverwundene Ellipsenflügel als tragende Fläche, Jahrbuch 1942 der Deutschen Luftfahrtforschung, p. I 111"}
)

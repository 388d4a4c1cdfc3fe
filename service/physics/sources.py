"""The bibliography: one record per publication that a number in this service rests on.

Bibliographic details were given from memory unless a note says otherwise; of a DOI only the syntax was
checked. Where a DOI was not certain it is left out, and the note says so.

In a record of kind ``"book"`` with pages, a chapter, `journal` is the book's title and, after a semicolon,
its publisher; for a whole book it is the publisher, and `volume` the edition or series. For a report
`journal` is the issuing body and `volume` the number of the report.

This file is longer than others because a bibliography is data: a new publication is one more record in its
alphabetical place.
"""

from collections.abc import Mapping
from types import MappingProxyType

from service.physics.declare import Source

APHA_2017 = Source(
    key="apha-2017",
    authors="APHA; AWWA; WEF",
    year=2017,
    title="Standard Methods for the Examination of Water and Wastewater",
    journal="American Public Health Association",
    volume="23rd edition",
    kind="book",
    note="method 4500-O, table of oxygen solubility; DOI not confirmed",
)

BENSON_KRAUSE_1980 = Source(
    key="benson-krause-1980",
    authors="Benson, B. B.; Krause, D.",
    year=1980,
    title=(
        "The concentration and isotopic fractionation of gases dissolved in freshwater in equilibrium "
        "with the atmosphere. 1. Oxygen"
    ),
    journal="Limnology and Oceanography",
    doi="10.4319/lo.1980.25.4.0662",
    volume="25",
    pages="662-671",
)

BENSON_KRAUSE_1984 = Source(
    key="benson-krause-1984",
    authors="Benson, B. B.; Krause, D.",
    year=1984,
    title=(
        "The concentration and isotopic fractionation of oxygen dissolved in freshwater and seawater in "
        "equilibrium with the atmosphere"
    ),
    journal="Limnology and Oceanography",
    doi="10.4319/lo.1984.29.3.0620",
    volume="29",
    pages="620-632",
)

BLOMQUIST_2017 = Source(
    key="blomquist-2017",
    authors=(
        "Blomquist, B. W.; Brumer, S. E.; Fairall, C. W.; Huebert, B. J.; Zappa, C. J.; Brooks, I. M.; "
        "Yang, M.; Bariteau, L.; Prytherch, J.; Hare, J. E.; Czerski, H.; Matei, A.; Pascal, R. W."
    ),
    year=2017,
    title=(
        "Wind speed and sea state dependencies of air-sea gas transfer: Results from the High Wind speed "
        "Gas exchange Study (HiWinGS)"
    ),
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1002/2017JC013181",
    volume="122",
    pages="8034-8062",
)

BORGES_2004 = Source(
    key="borges-2004",
    authors=(
        "Borges, A. V.; Vanderborght, J.-P.; Schiettecatte, L.-S.; Gazeau, F.; Ferrón-Smith, S.; Delille, "
        "B.; Frankignoulle, M."
    ),
    year=2004,
    title="Variability of the gas transfer velocity of CO2 in a macrotidal estuary (the Scheldt)",
    journal="Estuaries",
    doi="10.1007/BF02907647",
    volume="27",
    pages="593-603",
    note="the Scheldt paper; the same first author's paper on three estuaries of that year is another one",
)

BU_WARNER_1995 = Source(
    key="bu-warner-1995",
    authors="Bu, X.; Warner, M. J.",
    year=1995,
    title="Solubility of chlorofluorocarbon 113 in water and seawater",
    journal="Deep-Sea Research Part I",
    doi="10.1016/0967-0637(95)00052-8",
    volume="42",
    pages="1151-1161",
)

BULLISTER_2002 = Source(
    key="bullister-2002",
    authors="Bullister, J. L.; Wisegarver, D. P.; Menzia, F. A.",
    year=2002,
    title="The solubility of sulfur hexafluoride in water and seawater",
    journal="Deep-Sea Research Part I",
    doi="10.1016/S0967-0637(01)00051-6",
    volume="49",
    pages="175-187",
)

BULLISTER_WISEGARVER_1998 = Source(
    key="bullister-wisegarver-1998",
    authors="Bullister, J. L.; Wisegarver, D. P.",
    year=1998,
    title="The solubility of carbon tetrachloride in water and seawater",
    journal="Deep-Sea Research Part I",
    doi="10.1016/S0967-0637(98)00017-X",
    volume="45",
    pages="1285-1302",
)

BUTTERWORTH_MILLER_2016 = Source(
    key="butterworth-miller-2016",
    authors="Butterworth, B. J.; Miller, S. D.",
    year=2016,
    title="Air-sea exchange of carbon dioxide in the Southern Ocean and Antarctic marginal ice zone",
    journal="Geophysical Research Letters",
    doi="10.1002/2016GL069581",
    volume="43",
    pages="7223-7230",
)

COLE_CARACO_1998 = Source(
    key="cole-caraco-1998",
    authors="Cole, J. J.; Caraco, N. F.",
    year=1998,
    title=("Atmospheric exchange of carbon dioxide in a low-wind oligotrophic lake measured by the addition of SF6"),
    journal="Limnology and Oceanography",
    doi="10.4319/lo.1998.43.4.0647",
    volume="43",
    pages="647-656",
)

CRUSIUS_WANNINKHOF_2003 = Source(
    key="crusius-wanninkhof-2003",
    authors="Crusius, J.; Wanninkhof, R.",
    year=2003,
    title="Gas transfer velocities measured at low wind speed over a lake",
    journal="Limnology and Oceanography",
    doi="10.4319/lo.2003.48.3.1010",
    volume="48",
    pages="1010-1017",
)

DACEY_1984 = Source(
    key="dacey-1984",
    authors="Dacey, J. W. H.; Wakeham, S. G.; Howes, B. L.",
    year=1984,
    title="Henry's law constants for dimethylsulfide in freshwater and seawater",
    journal="Geophysical Research Letters",
    doi="10.1029/GL011i010p00991",
    volume="11",
    pages="991-994",
)

DE_BRUYN_SALTZMAN_1997 = Source(
    key="de-bruyn-saltzman-1997",
    authors="De Bruyn, W. J.; Saltzman, E. S.",
    year=1997,
    title="The solubility of methyl bromide in pure water, 35‰ sodium chloride and seawater",
    journal="Marine Chemistry",
    doi="10.1016/S0304-4203(96)00089-8",
    volume="56",
    pages="51-57",
)

DEIKE_MELVILLE_2018 = Source(
    key="deike-melville-2018",
    authors="Deike, L.; Melville, W. K.",
    year=2018,
    title="Gas transfer by breaking waves",
    journal="Geophysical Research Letters",
    doi="10.1029/2018GL078758",
    volume="45",
    pages="10482-10492",
)

DICKSON_1990_BORATE = Source(
    key="dickson-1990-borate",
    authors="Dickson, A. G.",
    year=1990,
    title="Thermodynamics of the dissociation of boric acid in synthetic seawater from 273.15 to 318.15 K",
    journal="Deep-Sea Research Part A",
    doi="10.1016/0198-0149(90)90004-F",
    volume="37",
    pages="755-766",
)

DICKSON_1990_SULPHATE = Source(
    key="dickson-1990-sulphate",
    authors="Dickson, A. G.",
    year=1990,
    title=(
        "Standard potential of the reaction: AgCl(s) + ½H2(g) = Ag(s) + HCl(aq), and the standard acidity "
        "constant of the ion HSO4− in synthetic sea water from 273.15 to 318.15 K"
    ),
    journal="Journal of Chemical Thermodynamics",
    doi="10.1016/0021-9614(90)90074-Z",
    volume="22",
    pages="113-127",
)

DICKSON_2007 = Source(
    key="dickson-2007",
    authors="Dickson, A. G.; Sabine, C. L.; Christian, J. R.",
    year=2007,
    title="Guide to Best Practices for Ocean CO2 Measurements",
    journal="North Pacific Marine Science Organization",
    volume="PICES Special Publication 3",
    kind="report",
    note="DOI not confirmed",
)

DICKSON_MILLERO_1987 = Source(
    key="dickson-millero-1987",
    authors="Dickson, A. G.; Millero, F. J.",
    year=1987,
    title="A comparison of the equilibrium constants for the dissociation of carbonic acid in seawater media",
    journal="Deep-Sea Research Part A",
    doi="10.1016/0198-0149(87)90021-5",
    volume="34",
    pages="1733-1743",
)

DICKSON_RILEY_1979 = Source(
    key="dickson-riley-1979",
    authors="Dickson, A. G.; Riley, J. P.",
    year=1979,
    title=(
        "The estimation of acid dissociation constants in seawater media from potentiometric titrations "
        "with strong base. I. The ionic product of water — Kw"
    ),
    journal="Marine Chemistry",
    doi="10.1016/0304-4203(79)90001-X",
    volume="7",
    pages="89-99",
)

DONLON_1999 = Source(
    key="donlon-1999",
    authors="Donlon, C. J.; Nightingale, T. J.; Sheasby, T.; Turner, J.; Robinson, I. S.; Emery, W. J.",
    year=1999,
    title="Implications of the oceanic thermal skin temperature deviation at high wind speed",
    journal="Geophysical Research Letters",
    doi="10.1029/1999GL900547",
    volume="26",
    pages="2505-2508",
)

DONLON_2002 = Source(
    key="donlon-2002",
    authors=(
        "Donlon, C. J.; Minnett, P. J.; Gentemann, C.; Nightingale, T. J.; Barton, I. J.; Ward, B.; Murray, M. J."
    ),
    year=2002,
    title=("Toward improved validation of satellite sea surface skin temperature measurements for climate research"),
    journal="Journal of Climate",
    doi="10.1175/1520-0442(2002)015<0353:TIVOSS>2.0.CO;2",
    volume="15",
    pages="353-369",
)

DUCE_1991 = Source(
    key="duce-1991",
    authors=(
        "Duce, R. A.; Liss, P. S.; Merrill, J. T.; Atlas, E. L.; Buat-Ménard, P.; Hicks, B. B.; Miller, "
        "J. M.; Prospero, J. M.; Arimoto, R.; Church, T. M.; Ellis, W.; Galloway, J. N.; Hansen, L.; "
        "Jickells, T. D.; Knap, A. H.; Reinhardt, K. H.; Schneider, B.; Soudine, A.; Tokos, J. J.; "
        "Tsunogai, S.; Wollast, R.; Zhou, M."
    ),
    year=1991,
    title="The atmospheric input of trace species to the world ocean",
    journal="Global Biogeochemical Cycles",
    doi="10.1029/91GB01778",
    volume="5",
    pages="193-259",
)

EDSON_2011 = Source(
    key="edson-2011",
    authors=(
        "Edson, J. B.; Fairall, C. W.; Bariteau, L.; Zappa, C. J.; Cifuentes-Lorenzen, A.; McGillis, W. "
        "R.; Pezoa, S.; Hare, J. E.; Helmig, D."
    ),
    year=2011,
    title=(
        "Direct covariance measurement of CO2 gas transfer velocity during the 2008 Southern Ocean Gas "
        "Exchange Experiment: Wind speed dependency"
    ),
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/2011JC007022",
    volume="116",
    pages="C00F10",
)

EGLESTON_2010 = Source(
    key="egleston-2010",
    authors="Egleston, E. S.; Sabine, C. L.; Morel, F. M. M.",
    year=2010,
    title=(
        "Revelle revisited: Buffer factors that quantify the response of ocean chemistry to changes in "
        "DIC and alkalinity"
    ),
    journal="Global Biogeochemical Cycles",
    doi="10.1029/2008GB003407",
    volume="24",
    pages="GB1002",
)

EMERSON_2019 = Source(
    key="emerson-2019",
    authors="Emerson, S.; Yang, B.; White, M.; Cronin, M.",
    year=2019,
    title="Air-sea gas transfer: Determining bubble fluxes with in situ N2 observations",
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/2018JC014786",
    volume="124",
    pages="2716-2727",
)

FAY_2021 = Source(
    key="fay-2021",
    authors=(
        "Fay, A. R.; Gregor, L.; Landschützer, P.; McKinley, G. A.; Gruber, N.; Gehlen, M.; Iida, Y.; "
        "Laruelle, G. G.; Rödenbeck, C.; Roobaert, A.; Zeng, J."
    ),
    year=2021,
    title="Harmonization of air-sea CO2 fluxes from surface pCO2 data products using a standardized approach",
    journal="Earth System Science Data",
    doi="10.5194/essd-13-4693-2021",
    volume="13",
    pages="4693-4710",
    note="subtitle only",
)

GARCIA_GORDON_1992 = Source(
    key="garcia-gordon-1992",
    authors="Garcia, H. E.; Gordon, L. I.",
    year=1992,
    title="Oxygen solubility in seawater: Better fitting equations",
    journal="Limnology and Oceanography",
    doi="10.4319/lo.1992.37.6.1307",
    volume="37",
    pages="1307-1312",
    note="Erratum: Limnology and Oceanography 38, 656 (1993)",
)

GLUECKAUF_1951 = Source(
    key="glueckauf-1951",
    authors="Glueckauf, E.",
    year=1951,
    title="The composition of atmospheric air",
    journal="Compendium of Meteorology; American Meteorological Society",
    pages="3-10",
    kind="book",
    note="DOI not confirmed",
)

HAMME_EMERSON_2004 = Source(
    key="hamme-emerson-2004",
    authors="Hamme, R. C.; Emerson, S. R.",
    year=2004,
    title="The solubility of neon, nitrogen and argon in distilled water and seawater",
    journal="Deep-Sea Research Part I",
    doi="10.1016/j.dsr.2004.06.009",
    volume="51",
    pages="1517-1528",
)

HAMME_SEVERINGHAUS_2007 = Source(
    key="hamme-severinghaus-2007",
    authors="Hamme, R. C.; Severinghaus, J. P.",
    year=2007,
    title="Trace gas disequilibria during deep-water formation",
    journal="Deep-Sea Research Part I",
    doi="10.1016/j.dsr.2007.03.008",
    volume="54",
    pages="939-950",
)

HAYDUK_LAUDIE_1974 = Source(
    key="hayduk-laudie-1974",
    authors="Hayduk, W.; Laudie, H.",
    year=1974,
    title="Prediction of diffusion coefficients for nonelectrolytes in dilute aqueous solutions",
    journal="AIChE Journal",
    doi="10.1002/aic.690200329",
    volume="20",
    pages="611-615",
)

HAYDUK_MINHAS_1982 = Source(
    key="hayduk-minhas-1982",
    authors="Hayduk, W.; Minhas, B. S.",
    year=1982,
    title="Correlations for prediction of molecular diffusivities in liquids",
    journal="Canadian Journal of Chemical Engineering",
    doi="10.1002/cjce.5450600213",
    volume="60",
    pages="295-299",
)

HIMMELBLAU_1964 = Source(
    key="himmelblau-1964",
    authors="Himmelblau, D. M.",
    year=1964,
    title="Diffusion of dissolved gases in liquids",
    journal="Chemical Reviews",
    doi="10.1021/cr60231a002",
    volume="64",
    pages="527-550",
)

HO_1997 = Source(
    key="ho-1997",
    authors="Ho, D. T.; Bliven, L. F.; Wanninkhof, R.; Schlosser, P.",
    year=1997,
    title="The effect of rain on air-water gas exchange",
    journal="Tellus B",
    volume="49",
    pages="149-158",
    note="DOI not confirmed",
)

HO_2006 = Source(
    key="ho-2006",
    authors="Ho, D. T.; Law, C. S.; Smith, M. J.; Schlosser, P.; Harvey, M.; Hill, P.",
    year=2006,
    title=(
        "Measurements of air-sea gas exchange at high wind speeds in the Southern Ocean: Implications for "
        "global parameterizations"
    ),
    journal="Geophysical Research Letters",
    doi="10.1029/2006GL026817",
    volume="33",
    pages="L16611",
)

HO_2016 = Source(
    key="ho-2016",
    authors="Ho, D. T.; Coffineau, N.; Hickman, B.; Chow, N.; Koffman, T.; Schlosser, P.",
    year=2016,
    title="Influence of current velocity and wind speed on air-water gas exchange in a mangrove estuary",
    journal="Geophysical Research Letters",
    doi="10.1002/2016GL068727",
    volume="43",
    pages="3813-3821",
)

HOOVER_BERKSHIRE_1969 = Source(
    key="hoover-berkshire-1969",
    authors="Hoover, T. E.; Berkshire, D. C.",
    year=1969,
    title="Effects of hydration on carbon dioxide exchange across an air-water interface",
    journal="Journal of Geophysical Research",
    doi="10.1029/JB074i002p00456",
    volume="74",
    pages="456-464",
)

HUBER_2009 = Source(
    key="huber-2009",
    authors=(
        "Huber, M. L.; Perkins, R. A.; Laesecke, A.; Friend, D. G.; Sengers, J. V.; Assael, M. J.; "
        "Metaxa, I. N.; Vogel, E.; Mareš, R.; Miyagawa, K."
    ),
    year=2009,
    title="New international formulation for the viscosity of H2O",
    journal="Journal of Physical and Chemical Reference Data",
    doi="10.1063/1.3088050",
    volume="38",
    pages="101-125",
)

ICAO_1993 = Source(
    key="icao-1993",
    authors="ICAO",
    year=1993,
    title="Manual of the ICAO Standard Atmosphere (extended to 80 kilometres (262 500 feet))",
    journal="International Civil Aviation Organization",
    volume="Doc 7488/3",
    kind="report",
    note="no DOI",
)

IOC_2013 = Source(
    key="ioc-2013",
    authors="IOC",
    year=2013,
    title=(
        "Ocean Data Standards, Vol. 3: Recommendation for a Quality Flag Scheme for the Exchange of "
        "Oceanographic and Marine Meteorological Data"
    ),
    journal="UNESCO",
    volume="IOC Manuals and Guides 54, vol. 3",
    kind="report",
    note="title from memory; DOI not confirmed",
)

IOC_SCOR_IAPSO_2010 = Source(
    key="ioc-scor-iapso-2010",
    authors="IOC; SCOR; IAPSO",
    year=2010,
    title=(
        "The international thermodynamic equation of seawater - 2010: Calculation and use of thermodynamic properties"
    ),
    journal="UNESCO",
    volume="IOC Manuals and Guides 56",
    kind="report",
    note="DOI not confirmed",
)

JAHNE_1987 = Source(
    key="jahne-1987",
    authors="Jähne, B.; Heinz, G.; Dietrich, W.",
    year=1987,
    title="Measurement of the diffusion coefficients of sparingly soluble gases in water",
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/JC092iC10p10767",
    volume="92",
    pages="10767-10776",
)

JCGM_2008_100 = Source(
    key="jcgm-2008-100",
    authors="JCGM",
    year=2008,
    title="Evaluation of measurement data - Guide to the expression of uncertainty in measurement",
    journal="Joint Committee for Guides in Metrology",
    volume="JCGM 100:2008",
    kind="report",
    note="DOI not confirmed",
)

JCGM_2008_101 = Source(
    key="jcgm-2008-101",
    authors="JCGM",
    year=2008,
    title=(
        'Evaluation of measurement data - Supplement 1 to the "Guide to the expression of uncertainty in '
        'measurement" - Propagation of distributions using a Monte Carlo method'
    ),
    journal="Joint Committee for Guides in Metrology",
    volume="JCGM 101:2008",
    kind="report",
    note="DOI not confirmed",
)

JENKINS_2019 = Source(
    key="jenkins-2019",
    authors="Jenkins, W. J.; Lott, D. E.; Cahill, K. L.",
    year=2019,
    title=(
        "A determination of atmospheric helium, neon, argon, krypton, and xenon solubility concentrations "
        "in water and seawater"
    ),
    journal="Marine Chemistry",
    doi="10.1016/j.marchem.2019.03.007",
    volume="211",
    pages="94-107",
)

JOHNSON_1982 = Source(
    key="johnson-1982",
    authors="Johnson, K. S.",
    year=1982,
    title="Carbon dioxide hydration and dehydration kinetics in seawater",
    journal="Limnology and Oceanography",
    doi="10.4319/lo.1982.27.5.0849",
    volume="27",
    pages="849-855",
)

JONES_2014 = Source(
    key="jones-2014",
    authors="Jones, D. C.; Ito, T.; Takano, Y.; Hsu, W.-C.",
    year=2014,
    title="Spatial and seasonal variability of the air-sea equilibration timescale of carbon dioxide",
    journal="Global Biogeochemical Cycles",
    doi="10.1002/2014GB004813",
    volume="28",
    pages="1163-1178",
)

KEELING_1998 = Source(
    key="keeling-1998",
    authors="Keeling, R. F.; Stephens, B. B.; Najjar, R. G.; Doney, S. C.; Archer, D.; Heimann, M.",
    year=1998,
    title=("Seasonal variations in the atmospheric O2/N2 ratio in relation to the kinetics of air-sea gas exchange"),
    journal="Global Biogeochemical Cycles",
    doi="10.1029/97GB02339",
    volume="12",
    pages="141-163",
)

KING_SALTZMAN_1995 = Source(
    key="king-saltzman-1995",
    authors="King, D. B.; Saltzman, E. S.",
    year=1995,
    title="Measurement of the diffusion coefficient of sulfur hexafluoride in water",
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/94JC03313",
    volume="100",
    pages="7083-7088",
)

LALIBERTE_2007 = Source(
    key="laliberte-2007",
    authors="Laliberté, M.",
    year=2007,
    title="Model for calculating the viscosity of aqueous solutions",
    journal="Journal of Chemical & Engineering Data",
    doi="10.1021/je0604075",
    volume="52",
    pages="321-335",
)

LARGE_POND_1981 = Source(
    key="large-pond-1981",
    authors="Large, W. G.; Pond, S.",
    year=1981,
    title="Open ocean momentum flux measurements in moderate to strong winds",
    journal="Journal of Physical Oceanography",
    doi="10.1175/1520-0485(1981)011<0324:OOMFMI>2.0.CO;2",
    volume="11",
    pages="324-336",
)

LEE_2010 = Source(
    key="lee-2010",
    authors="Lee, K.; Kim, T.-W.; Byrne, R. H.; Millero, F. J.; Feely, R. A.; Liu, Y.-M.",
    year=2010,
    title="The universal ratio of boron to chlorinity for the North Pacific and North Atlantic oceans",
    journal="Geochimica et Cosmochimica Acta",
    doi="10.1016/j.gca.2009.12.027",
    volume="74",
    pages="1801-1811",
)

LIANG_2013 = Source(
    key="liang-2013",
    authors="Liang, J.-H.; Deutsch, C.; McWilliams, J. C.; Baschek, B.; Sullivan, P. P.; Chiba, D.",
    year=2013,
    title="Parameterizing bubble-mediated air-sea gas exchange and its effect on ocean ventilation",
    journal="Global Biogeochemical Cycles",
    doi="10.1002/gbc.20080",
    volume="27",
    pages="894-905",
)

LISS_MERLIVAT_1986 = Source(
    key="liss-merlivat-1986",
    authors="Liss, P. S.; Merlivat, L.",
    year=1986,
    title="Air-sea gas exchange rates: Introduction and synthesis",
    journal="The Role of Air-Sea Exchange in Geochemical Cycling; Reidel",
    doi="10.1007/978-94-009-4738-2_5",
    pages="113-127",
    kind="book",
    note="Editor: P. Buat-Ménard",
)

LOOSE_2014 = Source(
    key="loose-2014",
    authors="Loose, B.; McGillis, W. R.; Perovich, D.; Zappa, C. J.; Schlosser, P.",
    year=2014,
    title="A parameter model of gas exchange for the seasonal sea ice zone",
    journal="Ocean Science",
    doi="10.5194/os-10-17-2014",
    volume="10",
    pages="17-28",
)

LUEKER_2000 = Source(
    key="lueker-2000",
    authors="Lueker, T. J.; Dickson, A. G.; Keeling, C. D.",
    year=2000,
    title=(
        "Ocean pCO2 calculated from dissolved inorganic carbon, alkalinity, and equations for K1 and K2: "
        "validation based on laboratory measurements of CO2 in gas and seawater at equilibrium"
    ),
    journal="Marine Chemistry",
    doi="10.1016/S0304-4203(00)00022-0",
    volume="70",
    pages="105-119",
)

MACHTA_HUGHES_1970 = Source(
    key="machta-hughes-1970",
    authors="Machta, L.; Hughes, E.",
    year=1970,
    title="Atmospheric oxygen in 1967 to 1970",
    journal="Science",
    doi="10.1126/science.168.3939.1582",
    volume="168",
    pages="1582-1584",
)

MACINTYRE_2010 = Source(
    key="macintyre-2010",
    authors="MacIntyre, S.; Jonsson, A.; Jansson, M.; Aberg, J.; Turney, D. E.; Miller, S. D.",
    year=2010,
    title="Buoyancy flux, turbulence, and the gas transfer coefficient in a stratified lake",
    journal="Geophysical Research Letters",
    doi="10.1029/2010GL044164",
    volume="37",
    pages="L24604",
)

MATTHAUS_1972 = Source(
    key="matthaus-1972",
    authors="Matthäus, W.",
    year=1972,
    title="Die Viskosität des Meerwassers",
    journal="Beiträge zur Meereskunde",
    volume="29",
    pages="93-107",
    note="title from memory; no DOI",
)

MCDOUGALL_2012 = Source(
    key="mcdougall-2012",
    authors="McDougall, T. J.; Jackett, D. R.; Millero, F. J.; Pawlowicz, R.; Barker, P. M.",
    year=2012,
    title="A global algorithm for estimating Absolute Salinity",
    journal="Ocean Science",
    doi="10.5194/os-8-1123-2012",
    volume="8",
    pages="1123-1134",
)

MCDOUGALL_BARKER_2011 = Source(
    key="mcdougall-barker-2011",
    authors="McDougall, T. J.; Barker, P. M.",
    year=2011,
    title="Getting started with TEOS-10 and the Gibbs Seawater (GSW) Oceanographic Toolbox",
    journal="SCOR/IAPSO Working Group 127",
    kind="report",
    note="no DOI",
)

MCGILLIS_2001 = Source(
    key="mcgillis-2001",
    authors="McGillis, W. R.; Edson, J. B.; Hare, J. E.; Fairall, C. W.",
    year=2001,
    title="Direct covariance air-sea CO2 fluxes",
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/2000JC000506",
    volume="106",
    pages="16729-16745",
)

MILLERO_1995 = Source(
    key="millero-1995",
    authors="Millero, F. J.",
    year=1995,
    title="Thermodynamics of the carbon dioxide system in the oceans",
    journal="Geochimica et Cosmochimica Acta",
    doi="10.1016/0016-7037(94)00354-O",
    volume="59",
    pages="661-677",
)

MILLERO_2008 = Source(
    key="millero-2008",
    authors="Millero, F. J.; Feistel, R.; Wright, D. G.; McDougall, T. J.",
    year=2008,
    title=("The composition of Standard Seawater and the definition of the Reference-Composition Salinity Scale"),
    journal="Deep-Sea Research Part I",
    doi="10.1016/j.dsr.2007.10.001",
    volume="55",
    pages="50-72",
)

MILLERO_2010 = Source(
    key="millero-2010",
    authors="Millero, F. J.",
    year=2010,
    title="Carbonate constants for estuarine waters",
    journal="Marine and Freshwater Research",
    doi="10.1071/MF09254",
    volume="61",
    pages="139-142",
)

MORRIS_RILEY_1966 = Source(
    key="morris-riley-1966",
    authors="Morris, A. W.; Riley, J. P.",
    year=1966,
    title="The bromide/chlorinity and sulphate/chlorinity ratio in sea water",
    journal="Deep-Sea Research and Oceanographic Abstracts",
    doi="10.1016/0011-7471(66)90601-2",
    volume="13",
    pages="699-705",
)

NAEGLER_2009 = Source(
    key="naegler-2009",
    authors="Naegler, T.",
    year=2009,
    title="Reconciliation of excess 14C-constrained global CO2 piston velocity estimates",
    journal="Tellus B",
    doi="10.1111/j.1600-0889.2008.00408.x",
    volume="61",
    pages="372-384",
)

NICHOLSON_2011 = Source(
    key="nicholson-2011",
    authors="Nicholson, D. P.; Emerson, S. R.; Khatiwala, S.; Hamme, R. C.",
    year=2011,
    title="An inverse approach to estimate bubble-mediated air-sea gas flux from inert gas measurements",
    journal="Gas Transfer at Water Surfaces 2010; Kyoto University Press",
    pages="223-237",
    kind="book",
    note="no DOI",
)

NICHOLSON_2016 = Source(
    key="nicholson-2016",
    authors="Nicholson, D. P.; Khatiwala, S.; Heimbach, P.",
    year=2016,
    title="Noble gas tracers of ventilation during deep-water formation in the Weddell Sea",
    journal="IOP Conference Series: Earth and Environmental Science",
    doi="10.1088/1755-1315/35/1/012019",
    volume="35",
    pages="012019",
)

NIGHTINGALE_2000 = Source(
    key="nightingale-2000",
    authors=(
        "Nightingale, P. D.; Malin, G.; Law, C. S.; Watson, A. J.; Liss, P. S.; Liddicoat, M. I.; Boutin, "
        "J.; Upstill-Goddard, R. C."
    ),
    year=2000,
    title=(
        "In situ evaluation of air-sea gas exchange parameterizations using novel conservative and volatile tracers"
    ),
    journal="Global Biogeochemical Cycles",
    doi="10.1029/1999GB900091",
    volume="14",
    pages="373-387",
)

OCONNOR_DOBBINS_1958 = Source(
    key="oconnor-dobbins-1958",
    authors="O'Connor, D. J.; Dobbins, W. E.",
    year=1958,
    title="Mechanism of reaeration in natural streams",
    journal="Transactions of the American Society of Civil Engineers",
    doi="10.1061/TACEAT.0007609",
    volume="123",
    pages="641-666",
)

ORR_EPITALON_2015 = Source(
    key="orr-epitalon-2015",
    authors="Orr, J. C.; Epitalon, J.-M.",
    year=2015,
    title="Improved routines to model the ocean carbonate system",
    journal="Geoscientific Model Development",
    doi="10.5194/gmd-8-485-2015",
    volume="8",
    pages="485-499",
    note="title without the name of the program",
)

PARK_2004 = Source(
    key="park-2004",
    authors="Park, S. Y.; Kim, J. S.; Lee, J. B.; Esler, M. B.; Davis, R. S.; Wielgosz, R. I.",
    year=2004,
    title=("A redetermination of the argon content of air for buoyancy corrections in mass standard comparisons"),
    journal="Metrologia",
    doi="10.1088/0026-1394/41/6/005",
    volume="41",
    pages="387-395",
)

PEREZ_FRAGA_1987 = Source(
    key="perez-fraga-1987",
    authors="Pérez, F. F.; Fraga, F.",
    year=1987,
    title="Association constant of fluoride and hydrogen ions in seawater",
    journal="Marine Chemistry",
    doi="10.1016/0304-4203(87)90036-3",
    volume="21",
    pages="161-168",
)

PICARD_2008 = Source(
    key="picard-2008",
    authors="Picard, A.; Davis, R. S.; Gläser, M.; Fujii, K.",
    year=2008,
    title="Revised formula for the density of moist air (CIPM-2007)",
    journal="Metrologia",
    doi="10.1088/0026-1394/45/2/004",
    volume="45",
    pages="149-155",
)

PINSENT_1956 = Source(
    key="pinsent-1956",
    authors="Pinsent, B. R. W.; Pearson, L.; Roughton, F. J. W.",
    year=1956,
    title="The kinetics of combination of carbon dioxide with hydroxide ions",
    journal="Transactions of the Faraday Society",
    doi="10.1039/TF9565201512",
    volume="52",
    pages="1512-1520",
)

PLUMMER_BUSENBERG_1982 = Source(
    key="plummer-busenberg-1982",
    authors="Plummer, L. N.; Busenberg, E.",
    year=1982,
    title=(
        "The solubilities of calcite, aragonite and vaterite in CO2-H2O solutions between 0 and 90 °C, "
        "and an evaluation of the aqueous model for the system CaCO3-CO2-H2O"
    ),
    journal="Geochimica et Cosmochimica Acta",
    doi="10.1016/0016-7037(82)90056-4",
    volume="46",
    pages="1011-1040",
)

POLING_2001 = Source(
    key="poling-2001",
    authors="Poling, B. E.; Prausnitz, J. M.; O'Connell, J. P.",
    year=2001,
    title="The Properties of Gases and Liquids",
    journal="McGraw-Hill",
    volume="5th edition",
    kind="book",
    note="DOI not confirmed",
)

PRESTON_THOMAS_1990 = Source(
    key="preston-thomas-1990",
    authors="Preston-Thomas, H.",
    year=1990,
    title="The International Temperature Scale of 1990 (ITS-90)",
    journal="Metrologia",
    doi="10.1088/0026-1394/27/1/002",
    volume="27",
    pages="3-10",
)

PROHASKA_2022 = Source(
    key="prohaska-2022",
    authors=(
        "Prohaska, T.; Irrgeher, J.; Benefield, J.; Böhlke, J. K.; Chesson, L. A.; Coplen, T. B.; Ding, "
        "T.; Dunn, P. J. H.; Gröning, M.; Holden, N. E.; Meijer, H. A. J.; Moossen, H.; Possolo, A.; "
        "Takahashi, Y.; Vogl, J.; Walczyk, T.; Wang, J.; Wieser, M. E.; Yoneda, S.; Zhu, X.-K.; Meija, J."
    ),
    year=2022,
    title="Standard atomic weights of the elements 2021 (IUPAC Technical Report)",
    journal="Pure and Applied Chemistry",
    doi="10.1515/pac-2019-0603",
    volume="94",
    pages="573-600",
)

QUACK_WALLACE_2003 = Source(
    key="quack-wallace-2003",
    authors="Quack, B.; Wallace, D. W. R.",
    year=2003,
    title="Air-sea flux of bromoform: Controls, rates, and implications",
    journal="Global Biogeochemical Cycles",
    doi="10.1029/2002GB001890",
    volume="17",
    pages="1023",
)

RAYMOND_2012 = Source(
    key="raymond-2012",
    authors=(
        "Raymond, P. A.; Zappa, C. J.; Butman, D.; Bott, T. L.; Potter, J.; Mulholland, P.; Laursen, A. "
        "E.; McDowell, W. H.; Newbold, D."
    ),
    year=2012,
    title="Scaling the gas transfer velocity and hydraulic geometry in streams and small rivers",
    journal="Limnology and Oceanography: Fluids and Environments",
    doi="10.1215/21573689-1597669",
    volume="2",
    pages="41-53",
)

RAYMOND_COLE_2001 = Source(
    key="raymond-cole-2001",
    authors="Raymond, P. A.; Cole, J. J.",
    year=2001,
    title="Gas exchange in rivers and estuaries: Choosing a gas transfer velocity",
    journal="Estuaries",
    doi="10.2307/1352954",
    volume="24",
    pages="312-317",
)

REICHL_DEIKE_2020 = Source(
    key="reichl-deike-2020",
    authors="Reichl, B. G.; Deike, L.",
    year=2020,
    title="Contribution of sea-state dependent bubbles to air-sea carbon dioxide fluxes",
    journal="Geophysical Research Letters",
    doi="10.1029/2020GL087267",
    volume="47",
    pages="e2020GL087267",
)

REUER_2007 = Source(
    key="reuer-2007",
    authors="Reuer, M. K.; Barnett, B. A.; Bender, M. L.; Falkowski, P. G.; Hendricks, M. B.",
    year=2007,
    title=(
        "New estimates of Southern Ocean biological production rates from O2/Ar ratios and the triple "
        "isotope composition of O2"
    ),
    journal="Deep-Sea Research Part I",
    doi="10.1016/j.dsr.2007.02.007",
    volume="54",
    pages="951-974",
)

RICHARDS_1998 = Source(
    key="richards-1998",
    authors="Richards, S. D.",
    year=1998,
    title="The effect of temperature, pressure, and salinity on sound attenuation in turbid seawater",
    journal="Journal of the Acoustical Society of America",
    volume="103",
    pages="205-211",
    note="DOI not confirmed",
)

RILEY_1965 = Source(
    key="riley-1965",
    authors="Riley, J. P.",
    year=1965,
    title="The occurrence of anomalously high fluoride concentrations in the North Atlantic",
    journal="Deep-Sea Research and Oceanographic Abstracts",
    doi="10.1016/0011-7471(65)90027-6",
    volume="12",
    pages="219-220",
)

RILEY_TONGUDAI_1967 = Source(
    key="riley-tongudai-1967",
    authors="Riley, J. P.; Tongudai, M.",
    year=1967,
    title="The major cation/chlorinity ratios in sea water",
    journal="Chemical Geology",
    doi="10.1016/0009-2541(67)90026-5",
    volume="2",
    pages="263-269",
)

ROQUET_2015 = Source(
    key="roquet-2015",
    authors="Roquet, F.; Madec, G.; McDougall, T. J.; Barker, P. M.",
    year=2015,
    title=(
        "Accurate polynomial expressions for the density and specific volume of seawater using the TEOS-10 standard"
    ),
    journal="Ocean Modelling",
    doi="10.1016/j.ocemod.2015.04.002",
    volume="90",
    pages="29-43",
)

ROSENTRETER_2017 = Source(
    key="rosentreter-2017",
    authors="Rosentreter, J. A.; Maher, D. T.; Ho, D. T.; Call, M.; Barr, J. G.; Eyre, B. D.",
    year=2017,
    title=(
        "Spatial and temporal variability of CO2 and CH4 gas transfer velocities and quantification of "
        "the CH4 microbubble flux in mangrove dominated estuaries"
    ),
    journal="Limnology and Oceanography",
    doi="10.1002/lno.10444",
    volume="62",
    pages="561-578",
)

SALTZMAN_1993 = Source(
    key="saltzman-1993",
    authors="Saltzman, E. S.; King, D. B.; Holmen, K.; Leck, C.",
    year=1993,
    title="Experimental determination of the diffusion coefficient of dimethylsulfide in water",
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/93JC01858",
    volume="98",
    pages="16481-16486",
)

SANDER_2015 = Source(
    key="sander-2015",
    authors="Sander, R.",
    year=2015,
    title="Compilation of Henry's law constants (version 4.0) for water as solvent",
    journal="Atmospheric Chemistry and Physics",
    doi="10.5194/acp-15-4399-2015",
    volume="15",
    pages="4399-4981",
)

SARMIENTO_GRUBER_2006 = Source(
    key="sarmiento-gruber-2006",
    authors="Sarmiento, J. L.; Gruber, N.",
    year=2006,
    title="Ocean Biogeochemical Dynamics",
    journal="Princeton University Press",
    kind="book",
    note="DOI not confirmed",
)

SCHUBERT_2012 = Source(
    key="schubert-2012",
    authors="Schubert, M.; Paschke, A.; Lieberman, E.; Burnett, W. C.",
    year=2012,
    title="Air-water partitioning of 222Rn and its dependence on water temperature and salinity",
    journal="Environmental Science & Technology",
    doi="10.1021/es204680n",
    volume="46",
    pages="3905-3911",
)

SHARQAWY_2010 = Source(
    key="sharqawy-2010",
    authors="Sharqawy, M. H.; Lienhard, J. H.; Zubair, S. M.",
    year=2010,
    title="Thermophysical properties of seawater: a review of existing correlations and data",
    journal="Desalination and Water Treatment",
    doi="10.5004/dwt.2010.1079",
    volume="16",
    pages="354-380",
)

SMITH_1980 = Source(
    key="smith-1980",
    authors="Smith, S. D.",
    year=1980,
    title="Wind stress and heat flux over the ocean in gale force winds",
    journal="Journal of Physical Oceanography",
    doi="10.1175/1520-0485(1980)010<0709:WSAHFO>2.0.CO;2",
    volume="10",
    pages="709-726",
)

SMITH_1988 = Source(
    key="smith-1988",
    authors="Smith, S. D.",
    year=1988,
    title=(
        "Coefficients for sea surface wind stress, heat flux, and wind profiles as a function of wind "
        "speed and temperature"
    ),
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/JC093iC12p15467",
    volume="93",
    pages="15467-15472",
)

SMITH_1999 = Source(
    key="smith-1999",
    authors="Smith, S. R.; Bourassa, M. A.; Sharp, R. J.",
    year=1999,
    title="Establishing more truth in true winds",
    journal="Journal of Atmospheric and Oceanic Technology",
    doi="10.1175/1520-0426(1999)016<0939:EMTITW>2.0.CO;2",
    volume="16",
    pages="939-952",
)

STANLEY_2009 = Source(
    key="stanley-2009",
    authors="Stanley, R. H. R.; Jenkins, W. J.; Lott, D. E.; Doney, S. C.",
    year=2009,
    title="Noble gas constraints on air-sea gas exchange and bubble fluxes",
    journal="Journal of Geophysical Research: Oceans",
    volume="114",
    pages="C11020",
    note="DOI not confirmed",
)

SWEENEY_2007 = Source(
    key="sweeney-2007",
    authors=("Sweeney, C.; Gloor, E.; Jacobson, A. R.; Key, R. M.; McKinley, G.; Sarmiento, J. L.; Wanninkhof, R."),
    year=2007,
    title="Constraining global air-sea gas exchange for CO2 with recent bomb 14C measurements",
    journal="Global Biogeochemical Cycles",
    doi="10.1029/2006GB002784",
    volume="21",
    pages="GB2015",
)

TAKAHASHI_1993 = Source(
    key="takahashi-1993",
    authors="Takahashi, T.; Olafsson, J.; Goddard, J. G.; Chipman, D. W.; Sutherland, S. C.",
    year=1993,
    title="Seasonal variation of CO2 and nutrients in the high-latitude surface oceans: A comparative study",
    journal="Global Biogeochemical Cycles",
    doi="10.1029/93GB02263",
    volume="7",
    pages="843-878",
)

TAKAHASHI_2009 = Source(
    key="takahashi-2009",
    authors=(
        "Takahashi, T.; Sutherland, S. C.; Wanninkhof, R.; Sweeney, C.; Feely, R. A.; Chipman, D. W.; "
        "Hales, B.; Friederich, G.; Chavez, F.; Sabine, C.; Watson, A.; Bakker, D. C. E.; Schuster, U.; "
        "Metzl, N.; Yoshikawa-Inoue, H.; Ishii, M.; Midorikawa, T.; Nojiri, Y.; Körtzinger, A.; "
        "Steinhoff, T.; Hoppema, M.; Olafsson, J.; Arnarson, T. S.; Tilbrook, B.; Johannessen, T.; Olsen, "
        "A.; Bellerby, R.; Wong, C. S.; Delille, B.; Bates, N. R.; de Baar, H. J. W."
    ),
    year=2009,
    title=(
        "Climatological mean and decadal change in surface ocean pCO2, and net sea-air CO2 flux over the global oceans"
    ),
    journal="Deep-Sea Research Part II",
    doi="10.1016/j.dsr2.2008.12.009",
    volume="56",
    pages="554-577",
)

TEETER_2018 = Source(
    key="teeter-2018",
    authors="Teeter, L.; Hamme, R. C.; Ianson, D.; Bianucci, L.",
    year=2018,
    title="Accurate estimation of net community production from O2/Ar measurements",
    journal="Global Biogeochemical Cycles",
    doi="10.1029/2017GB005874",
    volume="32",
    pages="1163-1181",
)

TIESINGA_2021 = Source(
    key="tiesinga-2021",
    authors="Tiesinga, E.; Mohr, P. J.; Newell, D. B.; Taylor, B. N.",
    year=2021,
    title="CODATA recommended values of the fundamental physical constants: 2018",
    journal="Reviews of Modern Physics",
    doi="10.1103/RevModPhys.93.025010",
    volume="93",
    pages="025010",
)

ULSETH_2019 = Source(
    key="ulseth-2019",
    authors="Ulseth, A. J.; Hall, R. O.; Boix Canadell, M.; Madinger, H. L.; Niayifar, A.; Battin, T. J.",
    year=2019,
    title="Distinct air-water gas exchange regimes in low- and high-energy streams",
    journal="Nature Geoscience",
    doi="10.1038/s41561-019-0324-8",
    volume="12",
    pages="259-263",
)

UPPSTROM_1974 = Source(
    key="uppstrom-1974",
    authors="Uppström, L. R.",
    year=1974,
    title="The boron/chlorinity ratio of deep-sea water from the Pacific Ocean",
    journal="Deep-Sea Research and Oceanographic Abstracts",
    doi="10.1016/0011-7471(74)90074-6",
    volume="21",
    pages="161-162",
)

VACHON_PRAIRIE_2013 = Source(
    key="vachon-prairie-2013",
    authors="Vachon, D.; Prairie, Y. T.",
    year=2013,
    title=("The ecosystem size and shape dependence of gas transfer velocity versus wind speed relationships in lakes"),
    journal="Canadian Journal of Fisheries and Aquatic Sciences",
    doi="10.1139/cjfas-2013-0241",
    volume="70",
    pages="1757-1764",
)

WAGNER_PRUSS_2002 = Source(
    key="wagner-pruss-2002",
    authors="Wagner, W.; Pruß, A.",
    year=2002,
    title=(
        "The IAPWS formulation 1995 for the thermodynamic properties of ordinary water substance for "
        "general and scientific use"
    ),
    journal="Journal of Physical and Chemical Reference Data",
    doi="10.1063/1.1461829",
    volume="31",
    pages="387-535",
)

WANNINKHOF_1992 = Source(
    key="wanninkhof-1992",
    authors="Wanninkhof, R.",
    year=1992,
    title="Relationship between wind speed and gas exchange over the ocean",
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/92JC00188",
    volume="97",
    pages="7373-7382",
)

WANNINKHOF_2009 = Source(
    key="wanninkhof-2009",
    authors="Wanninkhof, R.; Asher, W. E.; Ho, D. T.; Sweeney, C.; McGillis, W. R.",
    year=2009,
    title="Advances in quantifying air-sea gas exchange and environmental forcing",
    journal="Annual Review of Marine Science",
    doi="10.1146/annurev.marine.010908.163742",
    volume="1",
    pages="213-244",
)

WANNINKHOF_2014 = Source(
    key="wanninkhof-2014",
    authors="Wanninkhof, R.",
    year=2014,
    title="Relationship between wind speed and gas exchange over the ocean revisited",
    journal="Limnology and Oceanography: Methods",
    doi="10.4319/lom.2014.12.351",
    volume="12",
    pages="351-362",
)

WANNINKHOF_MCGILLIS_1999 = Source(
    key="wanninkhof-mcgillis-1999",
    authors="Wanninkhof, R.; McGillis, W. R.",
    year=1999,
    title="A cubic relationship between air-sea CO2 exchange and wind speed",
    journal="Geophysical Research Letters",
    doi="10.1029/1999GL900363",
    volume="26",
    pages="1889-1892",
)

WARNER_WEISS_1985 = Source(
    key="warner-weiss-1985",
    authors="Warner, M. J.; Weiss, R. F.",
    year=1985,
    title="Solubilities of chlorofluorocarbons 11 and 12 in water and seawater",
    journal="Deep-Sea Research Part A",
    doi="10.1016/0198-0149(85)90099-8",
    volume="32",
    pages="1485-1497",
)

WEIGEL_1978 = Source(
    key="weigel-1978",
    authors="Weigel, F.",
    year=1978,
    title="Radon",
    journal="Chemiker-Zeitung",
    volume="102",
    pages="287-299",
    note="title from memory; no DOI",
)

WEISS_1970 = Source(
    key="weiss-1970",
    authors="Weiss, R. F.",
    year=1970,
    title="The solubility of nitrogen, oxygen and argon in water and seawater",
    journal="Deep-Sea Research and Oceanographic Abstracts",
    doi="10.1016/0011-7471(70)90037-9",
    volume="17",
    pages="721-735",
)

WEISS_1971 = Source(
    key="weiss-1971",
    authors="Weiss, R. F.",
    year=1971,
    title="Solubility of helium and neon in water and seawater",
    journal="Journal of Chemical & Engineering Data",
    doi="10.1021/je60049a019",
    volume="16",
    pages="235-241",
)

WEISS_1974 = Source(
    key="weiss-1974",
    authors="Weiss, R. F.",
    year=1974,
    title="Carbon dioxide in water and seawater: the solubility of a non-ideal gas",
    journal="Marine Chemistry",
    doi="10.1016/0304-4203(74)90015-2",
    volume="2",
    pages="203-215",
)

WEISS_KYSER_1978 = Source(
    key="weiss-kyser-1978",
    authors="Weiss, R. F.; Kyser, T. K.",
    year=1978,
    title="Solubility of krypton in water and seawater",
    journal="Journal of Chemical & Engineering Data",
    doi="10.1021/je60076a014",
    volume="23",
    pages="69-72",
)

WEISS_PRICE_1980 = Source(
    key="weiss-price-1980",
    authors="Weiss, R. F.; Price, B. A.",
    year=1980,
    title="Nitrous oxide solubility in water and seawater",
    journal="Marine Chemistry",
    doi="10.1016/0304-4203(80)90024-9",
    volume="8",
    pages="347-359",
)

WIESENBURG_GUINASSO_1979 = Source(
    key="wiesenburg-guinasso-1979",
    authors="Wiesenburg, D. A.; Guinasso, N. L.",
    year=1979,
    title="Equilibrium solubilities of methane, carbon monoxide, and hydrogen in water and sea water",
    journal="Journal of Chemical & Engineering Data",
    doi="10.1021/je60083a006",
    volume="24",
    pages="356-360",
)

WILKE_CHANG_1955 = Source(
    key="wilke-chang-1955",
    authors="Wilke, C. R.; Chang, P.",
    year=1955,
    title="Correlation of diffusion coefficients in dilute solutions",
    journal="AIChE Journal",
    doi="10.1002/aic.690010222",
    volume="1",
    pages="264-270",
)

WOOD_CAPUTI_1966 = Source(
    key="wood-caputi-1966",
    authors="Wood, D.; Caputi, R.",
    year=1966,
    title="Solubilities of Kr and Xe in fresh and sea water",
    journal="U.S. Naval Radiological Defense Laboratory",
    volume="USNRDL-TR-988",
    kind="report",
    note="title from memory; no DOI",
)

WOOLF_1997 = Source(
    key="woolf-1997",
    authors="Woolf, D. K.",
    year=1997,
    title="Bubbles and their role in gas exchange",
    journal="The Sea Surface and Global Change; Cambridge University Press",
    doi="10.1017/CBO9780511525025.007",
    pages="173-205",
    kind="book",
    note="Editors: P. S. Liss and R. A. Duce",
)

WOOLF_THORPE_1991 = Source(
    key="woolf-thorpe-1991",
    authors="Woolf, D. K.; Thorpe, S. A.",
    year=1991,
    title="Bubbles and the air-sea exchange of gases in near-saturation conditions",
    journal="Journal of Marine Research",
    doi="10.1357/002224091784995765",
    volume="49",
    pages="435-466",
)

YAMAMOTO_1976 = Source(
    key="yamamoto-1976",
    authors="Yamamoto, S.; Alcauskas, J. B.; Crozier, T. E.",
    year=1976,
    title="Solubility of methane in distilled water and seawater",
    journal="Journal of Chemical & Engineering Data",
    doi="10.1021/je60068a029",
    volume="21",
    pages="78-80",
)

YANG_2022 = Source(
    key="yang-2022",
    authors=(
        "Yang, M.; Bell, T. G.; Bidlot, J.-R.; Blomquist, B. W.; Butterworth, B. J.; Dong, Y.; Fairall, "
        "C. W.; Landwehr, S.; Marandino, C. A.; Miller, S. D.; Saltzman, E. S.; Zavarsky, A."
    ),
    year=2022,
    title=("Global synthesis of air-sea CO2 transfer velocity estimates from ship-based eddy covariance measurements"),
    journal="Frontiers in Marine Science",
    doi="10.3389/fmars.2022.826421",
    volume="9",
    pages="826421",
)

YELLAND_TAYLOR_1996 = Source(
    key="yelland-taylor-1996",
    authors="Yelland, M.; Taylor, P. K.",
    year=1996,
    title="Wind stress measurements from the open ocean",
    journal="Journal of Physical Oceanography",
    doi="10.1175/1520-0485(1996)026<0541:WSMFTO>2.0.CO;2",
    volume="26",
    pages="541-558",
)

ZEEBE_WOLF_GLADROW_2001 = Source(
    key="zeebe-wolf-gladrow-2001",
    authors="Zeebe, R. E.; Wolf-Gladrow, D.",
    year=2001,
    title="CO2 in Seawater: Equilibrium, Kinetics, Isotopes",
    journal="Elsevier",
    volume="Elsevier Oceanography Series 65",
    kind="book",
    note="DOI not confirmed",
)

ZHANG_1995 = Source(
    key="zhang-1995",
    authors="Zhang, J.; Quay, P. D.; Wilbur, D. O.",
    year=1995,
    title="Carbon isotope fractionation during gas-water exchange and dissolution of CO2",
    journal="Geochimica et Cosmochimica Acta",
    doi="10.1016/0016-7037(95)91550-D",
    volume="59",
    pages="107-114",
)

ZHENG_1998 = Source(
    key="zheng-1998",
    authors="Zheng, M.; De Bruyn, W. J.; Saltzman, E. S.",
    year=1998,
    title="Measurements of the diffusion coefficients of CFC-11 and CFC-12 in pure water and seawater",
    journal="Journal of Geophysical Research: Oceans",
    doi="10.1029/97JC02761",
    volume="103",
    pages="1375-1379",
)

SOURCES: Mapping[str, Source] = MappingProxyType(
    {
        source.key: source
        for source in sorted(
            (value for value in globals().values() if isinstance(value, Source)),
            key=lambda source: source.key,
        )
    }
)

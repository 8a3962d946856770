const NAD83 =
  'GEOGCS["GCS_North_American_1983",DATUM["D_North_American_1983",SPHEROID["GRS_1980",6378137.0,298.257222101]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]]';

/** A .prj text, and a position in it with its degrees. */
export interface KnownProjection {
  name: string;
  prj: string;
  east: number;
  north: number;
  longitude: number;
  latitude: number;
}

/** Texts: GDAL 3.6.2 `gdalsrsinfo -o wkt_esri EPSG:…`. Positions: `echo "lon lat" | gdaltransform -s_srs OGC:CRS84 -t_srs EPSG:…`. */
export const KNOWN_PROJECTIONS: readonly KnownProjection[] = [
  {
    name: "Lambert conic in metres",
    prj: `PROJCS["NAD_1983_StatePlane_Kansas_South_FIPS_1502",${NAD83},PROJECTION["Lambert_Conformal_Conic"],PARAMETER["False_Easting",400000.0],PARAMETER["False_Northing",400000.0],PARAMETER["Central_Meridian",-98.5],PARAMETER["Standard_Parallel_1",38.5666666666667],PARAMETER["Standard_Parallel_2",37.2666666666667],PARAMETER["Latitude_Of_Origin",36.6666666666667],UNIT["Meter",1.0]]`,
    east: 390392.731341775,
    north: 593493.576495141,
    longitude: -98.61,
    latitude: 38.41,
  },
  {
    name: "Lambert conic in survey feet",
    prj: `PROJCS["NAD_1983_StatePlane_Kansas_North_FIPS_1501_Feet",${NAD83},PROJECTION["Lambert_Conformal_Conic"],PARAMETER["False_Easting",1312333.3333],PARAMETER["False_Northing",0.0],PARAMETER["Central_Meridian",-98.0],PARAMETER["Standard_Parallel_1",39.7833333333333],PARAMETER["Standard_Parallel_2",38.7166666666667],PARAMETER["Latitude_Of_Origin",38.3333333333333],UNIT["US survey foot",0.304800609601219]]`,
    east: 1137526.85132356,
    north: 28511.6018129988,
    longitude: -98.61,
    latitude: 38.41,
  },
  {
    name: "Albers conic, southern hemisphere",
    prj: 'PROJCS["GDA_1994_Australia_Albers",GEOGCS["GCS_GDA_1994",DATUM["D_GDA_1994",SPHEROID["GRS_1980",6378137.0,298.257222101]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],PROJECTION["Albers"],PARAMETER["False_Easting",0.0],PARAMETER["False_Northing",0.0],PARAMETER["Central_Meridian",132.0],PARAMETER["Standard_Parallel_1",-18.0],PARAMETER["Standard_Parallel_2",-36.0],PARAMETER["Latitude_Of_Origin",0.0],UNIT["Meter",1.0]]',
    east: 1301131.68478177,
    north: -3794273.74836383,
    longitude: 146.2,
    latitude: -34.1,
  },
  {
    name: "transverse Mercator, southern hemisphere",
    prj: 'PROJCS["NZGD_2000_New_Zealand_Transverse_Mercator",GEOGCS["GCS_NZGD_2000",DATUM["D_NZGD_2000",SPHEROID["GRS_1980",6378137.0,298.257222101]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],PROJECTION["Transverse_Mercator"],PARAMETER["False_Easting",1600000.0],PARAMETER["False_Northing",10000000.0],PARAMETER["Central_Meridian",173.0],PARAMETER["Scale_Factor",0.9996],PARAMETER["Latitude_Of_Origin",0.0],UNIT["Meter",1.0]]',
    east: 1559644.58494812,
    north: 5172431.28485079,
    longitude: 172.5,
    latitude: -43.6,
  },
];

/** As above, on a datum of its own: some hundred metres from WGS 84 unless it is shifted. */
export const OLD_DATUM: KnownProjection = {
  name: "a grid on an old datum",
  prj: 'PROJCS["DHDN_3_Degree_Gauss_Zone_3",GEOGCS["GCS_Deutsches_Hauptdreiecksnetz",DATUM["D_Deutsches_Hauptdreiecksnetz",SPHEROID["Bessel_1841",6377397.155,299.1528128]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],PROJECTION["Gauss_Kruger"],PARAMETER["False_Easting",3500000.0],PARAMETER["False_Northing",0.0],PARAMETER["Central_Meridian",9.0],PARAMETER["Scale_Factor",1.0],PARAMETER["Latitude_Of_Origin",0.0],UNIT["Meter",1.0]]',
  east: 3535021.56320269,
  north: 5674014.69508816,
  longitude: 9.5,
  latitude: 51.2,
};

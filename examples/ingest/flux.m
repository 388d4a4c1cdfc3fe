% Gets one number, sends a file, and sums it up:  octave --path examples/ingest --eval "flux"
% FILE is stations.csv unless given. The service is at CATSPAW_URL. MATLAB reads this too.
function flux(file)
  url = getenv('CATSPAW_URL');
  if isempty(url)
    url = 'http://127.0.0.1:8660';
  end
  if nargin < 1
    file = fullfile(fileparts(mfilename('fullpath')), 'stations.csv');
  end

  % One number. A blank in the address is %20.
  question = ['gas=co2&water_temperature=18.4&salinity=35.1&wind_speed=15%20kn' ...
              '&water_fugacity=372.4&air_fugacity=409.1&form=number'];
  number = str2double(urlread([url '/v1/flux?' question]));
  fprintf('one number: %.17g mmol m-2 d-1\n', number);

  % A file goes as the field csv of a form: the body of webwrite arrives empty.
  answer = urlread([url '/v1/flux?gas=co2'], 'post', {'csv', fileread(file)});
  [~, name, extension] = fileparts(file);
  target = fopen([name '_flux.csv'], 'w');
  fwrite(target, answer);
  fclose(target);

  % csvread takes a blank for zero; str2double takes it for NaN. The reason is last and may hold commas.
  lines = strsplit(strtrim(answer), char(10));
  place = find(strcmp(strsplit(lines{1}, ','), 'flux [mmol m-2 d-1]'));
  values = zeros(1, numel(lines) - 1);
  for row = 1:numel(values)
    cells = strsplit(lines{row + 1}, ',', 'CollapseDelimiters', false);
    values(row) = str2double(cells{place});
  end
  good = values(~isnan(values));
  fprintf('%s: %d rows answered, %d with a flux, mean %.4f mmol m-2 d-1\n', ...
          [name extension], numel(values), numel(good), mean(good));
end
